import type { Db } from './database'

/** A sealed sheet or addendum as it stands in the append-only table; `body` is its canonical JSON. */
export interface SheetRow {
  hash: string
  previousHash: string | null
  siteId: string
  number: number
  briefingId: string | null
  kind: 'sheet' | 'addendum'
  body: string
  signature: string | null
  keyId: string | null
  sealedBy: string | null
  sealedAt: string
}

/** The head of a site's chain, or null before its first sheet. */
export async function lastSheetOfSite(db: Db, siteId: string): Promise<Pick<SheetRow, 'hash' | 'number'> | null> {
  return await db('sheets').where({ siteId }).orderBy('number', 'desc').first('hash', 'number') ?? null
}

/** Appends to the chain; the table refuses a second child of the same sheet, and any later change. */
export async function insertSheet(db: Db, row: SheetRow): Promise<void> {
  await db('sheets').insert(row)
}

/** By its hash, or null. */
export async function getSheet(db: Db, hash: string): Promise<SheetRow | null> {
  return await db('sheets').where({ hash }).first() ?? null
}

/** The sheet of a briefing and its addenda, in the order of the chain. */
export const listSheetsOfBriefing = (db: Db, briefingId: string): Promise<SheetRow[]> => db('sheets').where({ briefingId }).orderBy('number')
