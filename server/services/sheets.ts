import { type BriefingSheet, canonicalSheet, hashInput, type SheetAddendum } from '#shared/domain/sheet'
import type { SheetCheckView } from '#shared/schemas/briefing'
import type { Db } from '../data/database'
import { getSheet, insertSheet, lastSheetOfSite, listSheetsOfBriefing, type SheetRow } from '../data/sheets'
import { requireReadableBriefing } from './briefing-access'
import { sha256 } from './hashing'
import { notFound } from './refusal'
import { checkSignature, loadSigningKey, signText, type SigningKey } from './signing-key'
import type { Settings } from './settings'
import type { Work } from './work'

/**
 * Appends a sheet or addendum to its site's chain; call it inside the transaction that seals. `build` gets the
 * sheet's number in the chain. Also used by the demo's seed, so that its history checks like any other.
 */
export async function appendSheet<Body extends BriefingSheet | SheetAddendum>(
  trx: Db, key: SigningKey, row: { siteId: string, briefingId: string, kind: SheetRow['kind'], sealedBy: string | null, sealedAt: string }, build: (number: number) => Body,
): Promise<{ hash: string, previousHash: string | null, number: number, body: Body }> {
  const last = await lastSheetOfSite(trx, row.siteId)
  const number = (last?.number ?? 0) + 1
  const previousHash = last?.hash ?? null
  const body = build(number)
  const input = hashInput({ previousHash, sheet: body })
  const hash = sha256(input)
  await insertSheet(trx, { ...row, hash, previousHash, number, body: canonicalSheet(body), signature: signText(key, input), keyId: key.keyId })
  return { hash, previousHash, number, body }
}

function parseBody(row: SheetRow): BriefingSheet | SheetAddendum | null {
  try {
    return JSON.parse(row.body) as BriefingSheet | SheetAddendum
  }
  catch {
    return null
  }
}

/** True when the row's own words still give its hash, whatever the row claims. */
function isWhole(row: SheetRow): boolean {
  try {
    return sha256(hashInput({ previousHash: row.previousHash, sheet: JSON.parse(row.body) })) === row.hash
  }
  catch {
    return false
  }
}

/** True when the sheet before it stands where the chain says, and is whole itself; a first sheet has nothing before it. */
async function isLinked(db: Db, row: SheetRow): Promise<boolean> {
  if (row.previousHash === null) return row.number === 1
  const previous = await getSheet(db, row.previousHash)
  return previous !== null && previous.siteId === row.siteId && previous.number === row.number - 1 && isWhole(previous)
}

/** Rechecks a sheet from its stored words: hash, link to the one before, signature. Throws 404 for an unknown hash. */
export async function checkSheet(db: Db, settings: Settings, hash: string): Promise<SheetCheckView> {
  const row = await getSheet(db, hash.toLowerCase())
  if (!row) throw notFound('sheet')
  const body = parseBody(row)
  const input = body ? hashInput({ previousHash: row.previousHash, sheet: body }) : ''
  const signature = checkSignature(loadSigningKey(settings), input, row)
  return {
    intact: isWhole(row) && signature !== 'invalid' && await isLinked(db, row),
    site: body?.siteCode ?? '', date: body?.date ?? '', count: body?.lines.length ?? 0, kind: row.kind, signature, clockWasSet: body?.isClockSet ?? false,
  }
}

function toJson(row: SheetRow) {
  return { sheet: JSON.parse(row.body) as unknown, previousHash: row.previousHash, hash: row.hash, ...(row.signature && { signature: row.signature }), ...(row.keyId && { keyId: row.keyId }) }
}

/** A briefing's sealed sheet and addenda; throws 404 when it is not sealed or not the actor's to read. */
export async function requireSheets(work: Work, briefingId: string): Promise<{ sheet: SheetRow, addenda: SheetRow[] }> {
  await requireReadableBriefing(work, briefingId)
  const [sheet, ...addenda] = await listSheetsOfBriefing(work.db, briefingId)
  if (!sheet) throw notFound('sheet')
  return { sheet, addenda }
}

/** The sheet as data, with what somebody needs to check it without us. */
export async function readSheetJson(work: Work, briefingId: string) {
  const { sheet, addenda } = await requireSheets(work, briefingId)
  const key = loadSigningKey(work.settings)
  const publicKey = sheet.keyId ? key.known.get(sheet.keyId)?.export({ format: 'jwk' }) : undefined
  return { ...toJson(sheet), publicKey: publicKey ?? null, addenda: addenda.map(toJson) }
}
