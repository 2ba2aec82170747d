import { randomUUID } from 'node:crypto'
import type { Db } from './database'

/** One taking-out of a quiz item, and its end when it was put back. */
export interface Strike {
  id: string
  itemId: string
  module: string
  reason: string
  struckBy: string
  struckAt: string
  restoreReason: string | null
  restoredBy: string | null
  restoredAt: string | null
}

/** A strike with the names of who did it. */
export interface NamedStrike extends Strike {
  striker: string
  restorer: string | null
}

const named = (db: Db) => db('struckItems').join('people as striker', 'striker.id', 'struckItems.struckBy').leftJoin('people as restorer', 'restorer.id', 'struckItems.restoredBy')
  .select('struckItems.*', 'striker.name as striker', 'restorer.name as restorer')

/** Ids of a module's items that are struck now. */
export async function listStruckIds(db: Db, module: string): Promise<Set<string>> {
  return new Set(await db('struckItems').where({ module }).whereNull('restoredAt').pluck('itemId'))
}

/** A module's strikes that stand now. */
export async function listStanding(db: Db, module: string): Promise<NamedStrike[]> {
  return named(db).where('struckItems.module', module).whereNull('restoredAt')
}

/** The strike of an item that stands now, or undefined. */
export async function findStrike(db: Db, itemId: string): Promise<Strike | undefined> {
  return db('struckItems').where({ itemId }).whereNull('restoredAt').first()
}

/** Every strike of an item, the newest first. */
export async function listStrikes(db: Db, itemId: string): Promise<NamedStrike[]> {
  return named(db).where({ itemId }).orderBy('struckAt', 'desc')
}

/** Takes an item out. */
export async function insertStrike(db: Db, strike: Pick<Strike, 'itemId' | 'module' | 'reason' | 'struckBy' | 'struckAt'>): Promise<void> {
  await db('struckItems').insert({ id: randomUUID(), ...strike })
}

/** Puts an item back; its row stays. */
export async function endStrike(db: Db, id: string, end: Pick<Strike, 'restoreReason' | 'restoredBy' | 'restoredAt'>): Promise<void> {
  await db('struckItems').where({ id }).update(end)
}
