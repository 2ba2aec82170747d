import type { Actor } from '#shared/access/abilities'
import type { Language, Role } from '#shared/domain/states'
import type { SessionView, SignInBody } from '#shared/schemas/session'
import { getSignInPerson, hasLeft, markFirstSignIn } from '../data/sign-in-secrets'
import { isRightSecret } from './passwords'
import { Refusal } from './refusal'
import { startSession } from './sessions'
import { countedForSignIn, countTry, forgetTries } from './slow-down'
import type { Work } from './work'

/** Somebody who has shown who they are. */
interface Proven { id: string, name: string, role: Role, language: Language }

/**
 * Finds out who somebody is by their secret, without starting a session. After five wrong tries waits grow, per badge
 * or e-mail *and* address; a hundred wrong tries from anywhere slow the account itself. Whether somebody exists is
 * not told apart, neither in words nor in time. Throws 401 for a wrong secret, 429 while a wait lasts.
 */
export async function provePerson(work: Work<Actor | null>, body: SignInBody, address: string): Promise<Proven> {
  const { db, now } = work
  const [via, name, secret] = 'email' in body ? ['password', body.email, body.password] as const : ['badge', body.badge, body.pin] as const
  const counted = countedForSignIn(via, name, address)
  await countTry(db, counted, now)
  const person = await getSignInPerson(db, via === 'password' ? { email: name } : { badge: name })
  const isRight = await isRightSecret(via === 'password' ? person?.passwordHash : person?.pinHash, secret)
  if (!person || !isRight || hasLeft(person, work.today)) {
    throw new Refusal('notSignedIn', via === 'password' ? 'wrongPassword' : 'wrongPin', { message: via === 'password' ? 'E-mail or password is wrong' : 'Badge or PIN is wrong' })
  }
  await forgetTries(db, counted)
  return { id: person.id, name: person.name, role: person.role, language: person.language }
}

/** Signs somebody in and answers the cookie to set; refuses like `provePerson`. */
export async function signIn(work: Work<null>, body: SignInBody, address: string): Promise<SessionView & { cookie: string }> {
  const person = await provePerson(work, body, address)
  return enter(work, person, 'email' in body ? 'password' : 'badge')
}

/** Starts the session of somebody who has just shown who they are. Never call it inside a transaction. */
export async function enter(work: Work<null>, { id, name, role, language }: Proven, via: 'password' | 'badge'): Promise<SessionView & { cookie: string }> {
  await markFirstSignIn(work.db, id, work.now)
  const cookie = await startSession(work.db, work.settings, id, via)
  return { cookie, person: { id, name, role: via === 'badge' ? 'worker' : role, language } }
}
