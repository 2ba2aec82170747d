import type { AuditView } from '#shared/schemas/audit'
import type { Db } from '../database'

export interface AuditFilter {
  subjectKind?: string
  subjectId?: string
  actor?: string
  action?: string
  /** Instants: from the first (included) to the second (excluded). */
  since?: string
  until?: string
}

function filtered(db: Db, { subjectKind, subjectId, actor, action, since, until }: AuditFilter) {
  const rows = db('audit')
  if (subjectKind) rows.where('audit.subjectKind', subjectKind)
  if (subjectId) rows.where('audit.subjectId', subjectId)
  if (actor) rows.where('audit.actorId', actor)
  if (action) rows.where('audit.action', action)
  if (since) rows.where('audit.at', '>=', since)
  if (until) rows.where('audit.at', '<', until)
  return rows
}

/** A page of the trail, the newest first, with names where the actor or subject is a person. */
export async function listAudit(db: Db, filter: AuditFilter, { page, perPage }: { page: number, perPage: number }): Promise<{ items: AuditView[], total: number }> {
  const [counted, rows] = [
    await filtered(db, filter).count({ total: '*' }).first(),
    await filtered(db, filter)
      .leftJoin('auditDetails', 'auditDetails.seq', 'audit.seq')
      .leftJoin('people as who', 'who.id', 'audit.actorId')
      .leftJoin('people as about', query => query.on('about.id', 'audit.subjectId').andOn('audit.subjectKind', db.raw('?', ['person'])))
      .orderBy('audit.seq', 'desc').limit(perPage).offset((page - 1) * perPage)
      .select('audit.*', 'auditDetails.details', 'who.name as actorName', 'about.name as subjectName'),
  ]
  const items = rows.map(row => ({
    seq: row.seq, at: row.at, actorId: row.actorId, actor: row.actorName, action: row.action,
    subject: { kind: row.subjectKind, id: row.subjectId, name: row.subjectName }, details: row.details ? JSON.parse(row.details) : null, hash: row.hash,
  }))
  return { items, total: Number(counted?.total ?? 0) }
}
