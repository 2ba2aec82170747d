import type { NewSecretBody, SessionView } from '#shared/schemas/session'
import type { Language } from '#shared/domain/states'
import { appendAudit } from '../data/audit'
import { getSignInPerson, writeLanguage, writeSecret } from '../data/sign-in-secrets'
import { hashSecret, isRightSecret } from './passwords'
import { notFound, Refusal } from './refusal'
import { assertGoodPassword, assertGoodPin } from './secret-quality'
import { endSessionsOf, startSession } from './sessions'
import { countTry, forgetTries } from './slow-down'
import type { Work } from './work'

/** Keeps the actor's language; their screens, documents and mail follow it. */
export async function changeOwnLanguage(work: Work, language: Language): Promise<SessionView> {
  const { personId, name, role } = work.actor
  await writeLanguage(work.db, personId, language, work.now)
  return { person: { id: personId, name, role, language } }
}

/**
 * Sets the actor's own password or PIN after asking for the one they signed in with, ends all their sessions and
 * answers the cookie of a new one. Somebody who came in by badge can't set a password: a PIN opens less than it does.
 */
export async function changeOwnSecret(work: Work, body: NewSecretBody): Promise<string> {
  const { db, now, settings, actor } = work
  const person = await getSignInPerson(db, { id: actor.personId })
  if (!person) throw notFound('person')
  if ('password' in body && (actor.via !== 'password' || !person.email)) throw new Refusal('forbidden', 'passwordSignInNeeded', { message: 'Sign in with e-mail and password to change the password' })
  const counted = [{ name: `own-secret:${person.id}`, free: 5 }]
  await countTry(db, counted, now)
  if (!await isRightSecret(actor.via === 'password' ? person.passwordHash : person.pinHash, body.current)) {
    throw new Refusal('unprocessable', 'wrongCurrent', { message: 'The present password or PIN is wrong', fields: { current: 'is wrong' } })
  }
  await forgetTries(db, counted)
  const isPassword = 'password' in body
  if (isPassword) await assertGoodPassword(body.password, [work.company.name, person.name, person.email])
  else assertGoodPin(body.pin, person.badge)
  const hashed = isPassword ? { passwordHash: await hashSecret(body.password) } : { pinHash: await hashSecret(body.pin) }
  await db.transaction(async (trx) => {
    await writeSecret(trx, person.id, hashed, now)
    await appendAudit(trx, { at: now, actorId: person.id, action: isPassword ? 'password.set' : 'pin.set', subject: { kind: 'person', id: person.id } })
  })
  await endSessionsOf(db, settings, person.id)
  return startSession(db, settings, person.id, actor.via)
}

/** Which ways in the actor has, and which they used now. */
export async function readOwnWays(work: Work) {
  const person = await getSignInPerson(work.db, { id: work.actor.personId })
  if (!person) throw notFound('person')
  return { via: work.actor.via, badge: person.badge, email: person.email, hasPin: person.pinHash !== null, hasPassword: person.passwordHash !== null }
}
