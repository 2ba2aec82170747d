import type { Actor } from '#shared/access/abilities'
import type { Language, Role } from '#shared/domain/states'
import type { SessionView, SignInBody } from '#shared/schemas/session'
import { countWrongTry, clearWrongTries, getWaitSeconds } from '../data/sign-in-waits'
import { isRightSecret } from './passwords'
import { Refusal } from './refusal'
import { startSession } from './sessions'
import { sha256 } from './hashing'
import type { Work } from './work'

/**
 * Finds out who somebody is by their secret, without starting a session. After five wrong tries waits grow, per badge
 * or e-mail *and* address, so that one guesser behind a shared address does not lock a crew out; a hundred wrong tries
 * from anywhere slow the account itself. Throws 401 for a wrong secret, 429 while a wait lasts.
 */
export async function provePerson(work: Work<Actor | null>, body: SignInBody, address: string): Promise<{ id: string, name: string, role: Role, language: Language }> {
  const { db, now } = work
  const [via, name, secret] = 'email' in body ? ['password', body.email, body.password] as const : ['badge', body.badge, body.pin] as const
  const keys = [{ key: sha256(`${via}:${name}:${address}`), free: 5 }, { key: sha256(`${via}:${name}`), free: 100 }]
  for (const { key } of keys) {
    const seconds = await getWaitSeconds(db, key, now)
    if (seconds > 0) throw new Refusal('tooMany', 'tooManyTries', { message: `Wait ${Math.ceil(seconds)} seconds, then try again`, retryAfter: seconds, data: { retryAfter: Math.ceil(seconds) } })
  }
  const row = await db('people').leftJoin('signInSecrets', 'people.id', 'signInSecrets.personId')
    .where(via === 'password' ? { email: name } : { badge: name })
    .first('people.id', 'people.name', 'people.role', 'people.language', 'people.leftOn', 'signInSecrets.passwordHash', 'signInSecrets.pinHash')
  const isRight = await isRightSecret(via === 'password' ? row?.passwordHash : row?.pinHash, secret)
  if (!row || !isRight || (row.leftOn && row.leftOn <= work.today)) {
    for (const { key, free } of keys) await countWrongTry(db, key, now, free)
    throw new Refusal('notSignedIn', via === 'password' ? 'wrongPassword' : 'wrongPin', { message: via === 'password' ? 'E-mail or password is wrong' : 'Badge or PIN is wrong' })
  }
  for (const { key } of keys) await clearWrongTries(db, key)
  return { id: row.id, name: row.name, role: row.role, language: row.language }
}

/** Signs somebody in and answers the cookie to set; refuses like `provePerson`. */
export async function signIn(work: Work<null>, body: SignInBody, address: string): Promise<SessionView & { cookie: string }> {
  const person = await provePerson(work, body, address)
  const via = 'email' in body ? 'password' : 'badge'
  const cookie = await startSession(work.db, work.settings, person.id, via)
  return { cookie, person: { ...person, role: via === 'badge' ? 'worker' : person.role } }
}
