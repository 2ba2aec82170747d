import { isCounting } from '#shared/domain/validity'
import { initialsOf } from '#shared/domain/names'
import type { CardCheck } from '#shared/schemas/credentials'
import { findCredentialByCode, findCredentialType } from '../data/credentials'
import { countWrongTry, getWaitSeconds } from '../data/sign-in-waits'
import { listCredentialsByIds } from '../data/views/credential-list'
import type { Actor } from '#shared/access/abilities'
import { notFound, Refusal } from './refusal'
import type { Work } from './work'

/** Unknown codes that one address may ask for before it has to wait. A code has 90 random bits; this only keeps guessing dull. */
const freeTries = 20

/** Spaces, dashes and small letters are forgiven; O is read as 0, I and L as 1 (Crockford's letters have none of them). */
const toCode = (typed: string) => typed.toUpperCase().replace(/[\s-]/g, '').replace(/O/g, '0').replace(/[IL]/g, '1')

/**
 * What a stranger may know of a card: whether it counts today in the company's zone, its type, the holder's initials.
 * Never why, never the name. An unknown code is 404; an address that asks for many has to wait (429), and a right
 * code is answered all the same, so that a guesser stops nobody at the gate.
 */
export async function checkCard(work: Work<Actor | null>, code: string, address: string): Promise<CardCheck> {
  const found = await findCredentialByCode(work.db, toCode(code))
  const key = `card:${address}`
  if (!found) {
    const wait = await getWaitSeconds(work.db, key, work.now)
    if (wait > 0) throw new Refusal('tooMany', 'wait', { message: 'Too many unknown codes from this address', retryAfter: wait, data: { retryAfter: Math.ceil(wait) } })
    await countWrongTry(work.db, key, work.now, freeTries)
    throw notFound('card')
  }
  const [item] = await listCredentialsByIds(work.db, [found.id], work.today)
  return { valid: isCounting(item!.state), type: item!.type, initials: initialsOf(found.name), checkedOn: work.today }
}

/** The names of a credential type, for the page that shows a check. */
export async function readTypeName(work: Work<Actor | null>, code: string): Promise<{ en: string, es: string }> {
  const type = await findCredentialType(work.db, code)
  if (!type) throw notFound('credential type')
  return type.name
}
