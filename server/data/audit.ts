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
  if (!db.isTransaction) return db.transaction(trx => appendAudit(trx, entry))
  const last = await db('audit').orderBy('seq', 'desc').first('seq', 'hash')
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
  await db('audit').insert({ ...row, hash: auditHash(row) })
  await db('auditDetails').insert({ seq: row.seq, details })
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
