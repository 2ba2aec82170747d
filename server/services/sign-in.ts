import type { SessionView, SignInBody } from '#shared/schemas/session'
import { countWrongTry, clearWrongTries, getWaitSeconds } from '../data/sign-in-waits'
import { isRightSecret } from './passwords'
import { Refusal } from './refusal'
import { startSession } from './sessions'
import { sha256 } from './hashing'
import type { Work } from './work'

/**
 * Signs somebody in and answers the cookie to set. After five wrong tries waits grow, per badge or e-mail *and*
 * address, so that one guesser behind a shared address does not lock a crew out; a hundred wrong tries from
 * anywhere slow the account itself.
 */
export async function signIn(work: Work<null>, body: SignInBody, address: string): Promise<SessionView & { cookie: string }> {
  const { db, now, settings } = work
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
  if (!row || !isRight || (row.leftOn && row.leftOn < work.today)) {
    for (const { key, free } of keys) await countWrongTry(db, key, now, free)
    throw new Refusal('notSignedIn', via === 'password' ? 'wrongPassword' : 'wrongPin', { message: via === 'password' ? 'E-mail or password is wrong' : 'Badge or PIN is wrong' })
  }
  for (const { key } of keys) await clearWrongTries(db, key)
  const cookie = await startSession(db, settings, row.id, via)
  return { cookie, person: { id: row.id, name: row.name, role: via === 'badge' ? 'worker' : row.role, language: row.language } }
}
