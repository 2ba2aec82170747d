import type { Db } from '../data/database'
import { clearWrongTries, countWrongTry, getWaitSeconds } from '../data/sign-in-waits'
import { sha256 } from './hashing'
import { Refusal } from './refusal'

/** What is counted, and how many wrong tries are free before waits begin. */
export interface Counted { name: string, free: number }

const keyOf = ({ name }: Counted) => sha256(name)

/**
 * Counts a try before its secret is looked at, so that a burst of tries at once gains nothing; a right one is taken
 * back with `forgetTries`. Throws 429 with the seconds to wait while one of the names must wait.
 */
export async function countTry(db: Db, counted: Counted[], now: string): Promise<void> {
  await db.transaction(async (trx) => {
    const waits = await Promise.all(counted.map(row => getWaitSeconds(trx, keyOf(row), now)))
    const seconds = Math.ceil(Math.max(0, ...waits))
    if (seconds > 0) throw new Refusal('tooMany', 'tooManyTries', { message: `Wait ${seconds} seconds, then try again`, retryAfter: seconds, data: { retryAfter: seconds } })
    for (const row of counted) await countWrongTry(trx, keyOf(row), now, row.free)
  })
}

/** Takes the counted tries back: the secret was right, or a new one was given. */
export async function forgetTries(db: Db, counted: Counted[]): Promise<void> {
  for (const row of counted) await clearWrongTries(db, keyOf(row))
}

/**
 * What a sign-in try counts against: the badge or e-mail *and* the address, so that one guesser behind a shared
 * address does not lock a crew out; and, far more patiently, the badge or e-mail from anywhere.
 */
export const countedForSignIn = (via: 'password' | 'badge', name: string, address: string): Counted[] => [
  { name: `${via}:${name}:${address}`, free: 5 },
  { name: `${via}:${name}`, free: 100 },
]
