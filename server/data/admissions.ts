import { addSeconds } from '#shared/domain/dates'
import type { Db } from './database'

export interface Admission { tokenHash: string, briefingId: string, browserHash: string, step: number, signInId: string | null }

/** Writes what a scanned code turned into. */
export async function insertAdmission(db: Db, admission: Omit<Admission, 'signInId'>, now: string): Promise<void> {
  await db('admissions').insert({ ...admission, createdAt: now })
}

/** By the hash of its token, or null. */
export async function getAdmission(db: Db, tokenHash: string): Promise<Admission | null> {
  return await db('admissions').where({ tokenHash }).first('tokenHash', 'briefingId', 'browserHash', 'step', 'signInId') ?? null
}

/** True when this browser was admitted to the briefing. */
export const hasAdmission = async (db: Db, briefingId: string, browserHash: string) => !!await db('admissions').where({ briefingId, browserHash }).first('tokenHash')

/** Remembers which sign-in an admission was used for. */
export async function useAdmission(db: Db, tokenHash: string, signInId: string): Promise<void> {
  await db('admissions').where({ tokenHash }).update({ signInId })
}

const freeTries = 5
const firstWaitSeconds = 30
const longestWaitSeconds = 15 * 60

/** Seconds that a browser still has to wait on this briefing; 0 when it may try. */
export async function codeWaitSeconds(db: Db, briefingId: string, browserHash: string, now: string): Promise<number> {
  const row = await db('presenceTries').where({ briefingId, browserHash }).first('waitUntil')
  return row?.waitUntil && row.waitUntil > now ? (Date.parse(row.waitUntil) - Date.parse(now)) / 1000 : 0
}

/** Counts a wrong code of a browser; the fifth and each one after it starts a wait that doubles. */
export async function countWrongCode(db: Db, briefingId: string, browserHash: string, now: string): Promise<void> {
  const row = await db('presenceTries').where({ briefingId, browserHash }).first('wrong')
  const wrong = (row?.wrong ?? 0) + 1
  const seconds = wrong < freeTries ? 0 : Math.min(longestWaitSeconds, firstWaitSeconds * 2 ** (wrong - freeTries))
  await db('presenceTries').insert({ briefingId, browserHash, wrong, waitUntil: seconds ? addSeconds(now, seconds) : null, updatedAt: now }).onConflict(['briefingId', 'browserHash']).merge()
}

/** Forgets a browser's wrong codes after a right one. */
export async function clearWrongCodes(db: Db, briefingId: string, browserHash: string): Promise<void> {
  await db('presenceTries').where({ briefingId, browserHash }).delete()
}

/** The row that counts wrong codes of everybody on a briefing within a minute. */
const everybody = '*'

/** Wrong codes on this briefing within the running minute, and when that minute ends. */
export async function wrongCodesThisMinute(db: Db, briefingId: string, now: string): Promise<{ wrong: number, secondsLeft: number }> {
  const row = await db('presenceTries').where({ briefingId, browserHash: everybody }).first('wrong', 'waitUntil')
  const secondsLeft = row?.waitUntil ? (Date.parse(row.waitUntil) - Date.parse(now)) / 1000 : 0
  return secondsLeft > 0 ? { wrong: row.wrong, secondsLeft } : { wrong: 0, secondsLeft: 0 }
}

/** Counts a wrong code for the briefing as a whole. */
export async function countWrongCodeOfAll(db: Db, briefingId: string, now: string): Promise<void> {
  const { wrong, secondsLeft } = await wrongCodesThisMinute(db, briefingId, now)
  const values = secondsLeft > 0 ? { wrong: wrong + 1, updatedAt: now } : { wrong: 1, waitUntil: addSeconds(now, 60), updatedAt: now }
  await db('presenceTries').insert({ briefingId, browserHash: everybody, ...values }).onConflict(['briefingId', 'browserHash']).merge(values)
}
