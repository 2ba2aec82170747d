import type { Db } from './database'

/** Wrong tries are forgotten when none came for this long. */
const forgottenAfterHours = 24

/** Seconds still to wait before this key may try again; 0 when it may. */
export async function getWaitSeconds(db: Db, key: string, now: string): Promise<number> {
  const row = await db('signInWaits').where({ key }).first('waitUntil')
  return row?.waitUntil && row.waitUntil > now ? (Date.parse(row.waitUntil) - Date.parse(now)) / 1000 : 0
}

/** Counts a wrong try; from the `free`th on, each makes the wait longer (30 s, 1 min, 2 min … at most an hour). */
export async function countWrongTry(db: Db, key: string, now: string, free = 5): Promise<void> {
  const row = await db('signInWaits').where({ key }).first('wrong', 'updatedAt')
  const isOld = !!row && Date.parse(now) - Date.parse(row.updatedAt) > forgottenAfterHours * 3_600_000
  const wrong = (isOld ? 0 : row?.wrong ?? 0) + 1
  const seconds = wrong < free ? 0 : Math.min(3600, 30 * 2 ** Math.min(wrong - free, 10))
  const waitUntil = seconds ? new Date(Date.parse(now) + seconds * 1000).toISOString() : null
  await db('signInWaits').insert({ key, wrong, waitUntil, updatedAt: now }).onConflict('key').merge()
}

/** Forgets the wrong tries of a key after a right one. */
export async function clearWrongTries(db: Db, key: string): Promise<void> {
  await db('signInWaits').where({ key }).delete()
}
