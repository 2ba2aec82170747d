import type { NearMissKind } from '#shared/domain/near-misses'
import type { Db } from './database'

/** A near miss as it was reported. `reporterId` is null when it was anonymous. */
export interface NearMiss {
  id: string
  siteId: string
  reporterId: string | null
  kind: NearMissKind
  what: string
  happenedAt: string
  /** The site's date. */
  happenedOn: string
  fileIds: string[]
  reportedAt: string
  answer: string | null
  answeredBy: string | null
  answeredAt: string | null
}
/** With the names that a screen shows. */
export type NamedNearMiss = NearMiss & { site: string, reporter: string | null, answerer: string | null }

/** Keeps a report. */
export async function insertNearMiss(db: Db, report: NearMiss): Promise<void> {
  await db('nearMisses').insert({ ...report, fileIds: JSON.stringify(report.fileIds) })
}

/** Reports, the newest first: everybody's, or those of one person. */
export async function listNearMisses(db: Db, match: { reporterId?: string, id?: string }): Promise<NamedNearMiss[]> {
  const rows = await db('nearMisses as n').join('sites', 'sites.id', 'n.siteId').leftJoin('people as reporter', 'reporter.id', 'n.reporterId').leftJoin('people as answerer', 'answerer.id', 'n.answeredBy')
    .modify((query) => {
      if (match.reporterId !== undefined) query.where('n.reporterId', match.reporterId)
      if (match.id !== undefined) query.where('n.id', match.id)
    })
    .orderBy('n.happenedAt', 'desc').limit(300).select('n.*', 'sites.name as site', 'reporter.name as reporter', 'answerer.name as answerer')
  return (rows as (Omit<NamedNearMiss, 'fileIds'> & { fileIds: string })[]).map(row => ({ ...row, fileIds: JSON.parse(row.fileIds) as string[] }))
}

/** What happened since a date, for the talks that speak of it. */
export async function listNearMissesSince(db: Db, date: string): Promise<{ kind: NearMissKind, happenedOn: string, siteId: string }[]> {
  return db('nearMisses').where('happenedOn', '>=', date).orderBy('happenedOn', 'desc').select('kind', 'happenedOn', 'siteId')
}

/** Says what was done about a report; a later word takes the place of an earlier one. */
export async function answerNearMiss(db: Db, id: string, answered: { answer: string, answeredBy: string, answeredAt: string }): Promise<void> {
  await db('nearMisses').where({ id }).update(answered)
}

/** Forgets who sent these files, so that an anonymous report stays one. */
export async function forgetFileOwners(db: Db, ids: readonly string[]): Promise<void> {
  await db('files').whereIn('id', ids).update({ ownerId: null })
}
