import { toString as toQr } from 'qrcode'
import { addDays } from '#shared/domain/dates'
import type { JoinBody, JoinView } from '#shared/schemas/links'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { endLinks, getUsableLink, insertLink, useLinkUp } from '../data/links'
import { isWithin } from '../data/reach'
import { getSignInPerson, hasLeft, writeLanguage, writeSecret, type SignInPerson } from '../data/sign-in-secrets'
import { randomToken, sha256 } from './hashing'
import { hashSecret } from './passwords'
import { notFound, Refusal } from './refusal'
import { assertGoodPassword, assertGoodPin } from './secret-quality'
import { endSessionsOf } from './sessions'
import { enter } from './sign-in'
import { countedForSignIn, forgetTries } from './slow-down'
import type { Work } from './work'

const joinLinkDays = 7

interface Shown { url: string, qr: string, expiresAt: string }

/**
 * The person, if the actor may give them a way in: an admin everybody, a lead the workers of crews they lead. A lead
 * never opens a door to more than a worker may do. Throws 404 outside the reach, 409 when they left, 403 otherwise.
 */
async function loadForWayIn(work: Work, personId: string): Promise<SignInPerson> {
  const person = await getSignInPerson(work.db, { id: personId })
  const { crewIds } = await work.reach()
  if (!person || !(crewIds === 'all' || isWithin(crewIds, person.crewId))) throw notFound('person')
  if (work.actor.role !== 'admin' && person.role !== 'worker') throw new Refusal('forbidden', 'forbidden', { message: 'Only the office may do this for a lead or manager' })
  if (hasLeft(person, work.today)) throw new Refusal('conflict', 'hasLeft', { message: 'This person has left the company' })
  return person
}

/** Makes the one link that works for this person; earlier ones end. Inside the caller's transaction. */
async function writeJoinLink(db: Db, work: Work, personId: string): Promise<{ token: string, expiresAt: string }> {
  const token = randomToken()
  const expiresAt = `${addDays(work.now.slice(0, 10), joinLinkDays)}${work.now.slice(10)}`
  await endLinks(db, 'join', personId, work.now)
  await insertLink(db, { tokenHash: sha256(token), kind: 'join', personId, createdBy: work.actor.personId, createdAt: work.now, expiresAt })
  return { token, expiresAt }
}

async function show(origin: string, { token, expiresAt }: { token: string, expiresAt: string }): Promise<Shown> {
  const url = `${origin}/join/${token}`
  return { url, qr: await toQr(url, { type: 'svg', errorCorrectionLevel: 'Q', margin: 4 }), expiresAt }
}

/** A link for somebody's first sign-in: works once, for seven days. Throws 409 when they have signed in before. */
export async function makeJoinLink(work: Work, personId: string, origin: string): Promise<Shown> {
  const person = await loadForWayIn(work, personId)
  if (person.firstUsedAt) throw new Refusal('conflict', 'alreadyJoined', { message: 'This person has signed in before; reset the PIN or password instead' })
  const link = await work.db.transaction(async (trx) => {
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'person.invited', subject: { kind: 'person', id: person.id } })
    return writeJoinLink(trx, work, person.id)
  })
  return show(origin, link)
}

/** Ends somebody's PIN and sessions at once and makes a link with which they set a new one; they stand beside whoever asks. */
export async function resetPin(work: Work, personId: string, origin: string): Promise<Shown> {
  const person = await loadForWayIn(work, personId)
  const link = await work.db.transaction(async (trx) => {
    await writeSecret(trx, person.id, { pinHash: null }, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'pin.reset', subject: { kind: 'person', id: person.id } })
    return writeJoinLink(trx, work, person.id)
  })
  await endSessionsOf(work.db, work.settings, person.id)
  return show(origin, link)
}

const linkOver = () => new Refusal('notFound', 'linkOver', { message: 'This link was used or is too old; ask for a new one' })

/** What somebody must choose: managers and leads with an e-mail a password, once; everybody else a PIN. */
const whatIsNeeded = (person: SignInPerson): JoinView['needs'] => (person.role !== 'worker' && person.email && !person.passwordHash ? 'password' : 'pin')

async function loadJoining(work: Work<null>, token: string): Promise<SignInPerson> {
  const link = await getUsableLink(work.db, 'join', sha256(token), work.now)
  const person = link && await getSignInPerson(work.db, { id: link.personId })
  if (!person || hasLeft(person, work.today)) throw linkOver()
  return person
}

/** Who a join link greets. Throws 404 `linkOver` when it was used, ran out or never was. */
export async function readJoinLink(work: Work<null>, token: string): Promise<JoinView> {
  const person = await loadJoining(work, token)
  return { name: person.name, language: person.language, needs: whatIsNeeded(person), badge: person.badge, company: work.company.name }
}

async function toSecret(work: Work<null>, person: SignInPerson, body: JoinBody) {
  if ('pin' in body) {
    if (whatIsNeeded(person) === 'password') throw new Refusal('unprocessable', 'passwordAsked', { message: 'This role signs in with a password', fields: { password: 'is needed' } })
    assertGoodPin(body.pin, person.badge)
    return { via: 'badge' as const, hashed: { pinHash: await hashSecret(body.pin) } }
  }
  // A PIN reset, given in person, must not turn into a new password.
  await assertGoodPassword(body.password, [work.company.name, person.name, person.email])
  return { via: 'password' as const, hashed: { passwordHash: await hashSecret(body.password) } }
}

/** Sets the first PIN or password, uses the link up and signs the person in. */
export async function join(work: Work<null>, token: string, body: JoinBody, address: string) {
  const person = await loadJoining(work, token)
  const { via, hashed } = await toSecret(work, person, body)
  await work.db.transaction(async (trx) => {
    if (!await useLinkUp(trx, sha256(token), work.now)) throw linkOver()
    await writeSecret(trx, person.id, hashed, work.now)
    await writeLanguage(trx, person.id, body.language, work.now)
    await appendAudit(trx, { at: work.now, actorId: person.id, action: via === 'badge' ? 'pin.set' : 'password.set', subject: { kind: 'person', id: person.id } })
  })
  await forgetTries(work.db, countedForSignIn(via, via === 'badge' ? person.badge : person.email!, address))
  return enter(work, { ...person, language: body.language }, via)
}
