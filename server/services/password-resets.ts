import { setTimeout as wait } from 'node:timers/promises'
import { appendAudit } from '../data/audit'
import { endLinks, getUsableLink, insertLink, useLinkUp } from '../data/links'
import { getSignInPerson, hasLeft, writeSecret, type SignInPerson } from '../data/sign-in-secrets'
import { passwordResetMail } from '../documents/mail/password-reset'
import { randomToken, sha256 } from './hashing'
import { queueMail } from './mail'
import { hashSecret } from './passwords'
import { Refusal } from './refusal'
import { assertGoodPassword } from './secret-quality'
import { endSessionsOf } from './sessions'
import { enter } from './sign-in'
import { countedForSignIn, countTry, forgetTries, type Counted } from './slow-down'
import type { Work } from './work'

const resetLinkMinutes = 60
/** Every request for a reset takes at least this long, so that its time does not tell whether the address is known. */
const answerAfterMilliseconds = 150

const countedForReset = (email: string): Counted[] => [{ name: `password-reset:${email}`, free: 4 }]

async function sendResetLink(work: Work<null>, email: string): Promise<void> {
  const { db, now, settings } = work
  const isTooOften = await countTry(db, countedForReset(email), now).then(() => false, (error: unknown) => {
    if (error instanceof Refusal && error.kind === 'tooMany') return true
    throw error
  })
  const person = await getSignInPerson(db, { email })
  if (isTooOften || !person || hasLeft(person, work.today)) return
  const token = randomToken()
  const expiresAt = new Date(Date.parse(now) + resetLinkMinutes * 60_000).toISOString()
  const message = passwordResetMail(person.language, { name: person.name, link: `${settings.linkOrigin}/reset/${token}` })
  await db.transaction(async (trx) => {
    await endLinks(trx, 'passwordReset', person.id, now)
    await insertLink(trx, { tokenHash: sha256(token), kind: 'passwordReset', personId: person.id, createdBy: null, createdAt: now, expiresAt })
    await queueMail(trx, { key: `password-reset:${sha256(token)}`, recipient: email, personId: person.id, ...message, now })
    await appendAudit(trx, { at: now, actorId: null, action: 'password.resetAsked', subject: { kind: 'person', id: person.id } })
  })
}

/** Mails a reset link to the address if somebody here has it; answers the same, in the same time, when nobody does. */
export async function askForReset(work: Work<null>, email: string): Promise<void> {
  await Promise.all([sendResetLink(work, email), wait(answerAfterMilliseconds)])
}

const linkOver = () => new Refusal('notFound', 'linkOver', { message: 'This link was used or is too old; ask for a new one' })

async function loadResetting(work: Work<null>, token: string): Promise<SignInPerson & { email: string }> {
  const link = await getUsableLink(work.db, 'passwordReset', sha256(token), work.now)
  const person = link && await getSignInPerson(work.db, { id: link.personId })
  if (!person?.email || hasLeft(person, work.today)) throw linkOver()
  return { ...person, email: person.email }
}

/** Whose password a mailed link sets. Throws 404 `linkOver` when it was used, ran out or never was. */
export async function readResetLink(work: Work<null>, token: string) {
  const { email, language } = await loadResetting(work, token)
  return { email, language }
}

/** Sets the new password, ends every session of the person, and signs them in here. */
export async function resetPassword(work: Work<null>, token: string, password: string, address: string) {
  const person = await loadResetting(work, token)
  await assertGoodPassword(password, [work.company.name, person.name, person.email])
  const passwordHash = await hashSecret(password)
  await work.db.transaction(async (trx) => {
    if (!await useLinkUp(trx, sha256(token), work.now)) throw linkOver()
    await writeSecret(trx, person.id, { passwordHash }, work.now)
    await appendAudit(trx, { at: work.now, actorId: person.id, action: 'password.set', subject: { kind: 'person', id: person.id } })
  })
  await endSessionsOf(work.db, work.settings, person.id)
  await forgetTries(work.db, [...countedForSignIn('password', person.email, address), ...countedForReset(person.email)])
  return enter(work, person, 'password')
}
