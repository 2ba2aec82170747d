import { canonicalJson, sha256 } from '../services/hashing'
import type { Db } from './database'

export interface AuditEntry {
  at: string
  actorId: string | null
  /** A stable word: `credential.withdrawn`, `person.changed`. */
  action: string
  subject: { kind: string, id: string }
  before?: unknown
  after?: unknown
}

const firstHash = '0'.repeat(64)
/** Well within SQLite's limit of bound values. */
const rowsPerInsert = 100

/** The part of an audit row that its hash covers. */
export function auditHash(row: { seq: number, at: string, actorId: string | null, action: string, subjectKind: string, subjectId: string, detailsDigest: string, previousHash: string }): string {
  const { seq, at, actorId, action, subjectKind, subjectId, detailsDigest, previousHash } = row
  return sha256(canonicalJson({ seq, at, actorId, action, subjectKind, subjectId, detailsDigest, previousHash }))
}

/**
 * Appends one row to the audit chain; call it inside the transaction of the change that it records. Without one it
 * opens its own, so that nobody can append between its reading of the last row and its writing of the next.
 * The details stand in a table of their own, so that they can be erased without breaking the chain over their digests.
 */
export async function appendAudit(db: Db, entry: AuditEntry): Promise<void> {
  await appendAuditRows(db, [entry])
}

/** Appends several rows in the order given, for work that records much at once. */
export async function appendAuditRows(db: Db, entries: readonly AuditEntry[]): Promise<void> {
  let last: { seq: number, hash: string } | undefined = await db('audit').orderBy('seq', 'desc').first('seq', 'hash')
  const rows = []
  const allDetails = []
  for (const entry of entries) {
    const details = JSON.stringify({ before: entry.before ?? null, after: entry.after ?? null })
    const row = {
      seq: (last?.seq ?? 0) + 1,
      at: entry.at,
      actorId: entry.actorId,
      action: entry.action,
      subjectKind: entry.subject.kind,
      subjectId: entry.subject.id,
      detailsDigest: sha256(details),
      previousHash: last?.hash ?? firstHash,
    }
    last = { seq: row.seq, hash: auditHash(row) }
    rows.push({ ...row, hash: last.hash })
    allDetails.push({ seq: row.seq, details })
  }
  for (let start = 0; start < rows.length; start += rowsPerInsert) {
    await db('audit').insert(rows.slice(start, start + rowsPerInsert))
    await db('auditDetails').insert(allDetails.slice(start, start + rowsPerInsert))
  }
}

/** Recomputes the whole chain. `brokenAt` is the first row whose hash, link or details no longer fit. */
export async function checkAuditChain(db: Db): Promise<{ intact: boolean, rows: number, brokenAt?: number }> {
  let previousHash = firstHash
  let rows = 0
  const pageSize = 1000
  for (;;) {
    const page = await db('audit').leftJoin('auditDetails', 'audit.seq', 'auditDetails.seq')
      .where('audit.seq', '>', rows).orderBy('audit.seq').limit(pageSize).select('audit.*', 'auditDetails.details')
    for (const row of page) {
      const isLinked = row.seq === rows + 1 && row.previousHash === previousHash && auditHash(row) === row.hash
      const isWhole = row.details === null || sha256(row.details) === row.detailsDigest
      if (!isLinked || !isWhole) return { intact: false, rows, brokenAt: row.seq }
      previousHash = row.hash
      rows++
    }
    if (page.length < pageSize) return { intact: true, rows }
  }
}
