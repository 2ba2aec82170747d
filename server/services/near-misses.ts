import { randomUUID } from 'node:crypto'
import { compareInstants, dateInZone } from '#shared/domain/dates'
import type { NearMissBody, NearMissView } from '#shared/schemas/near-misses'
import { can } from '#shared/access/abilities'
import { appendAudit } from '../data/audit'
import { findFile } from '../data/files'
import { answerNearMiss, forgetFileOwners, insertNearMiss, listNearMisses, type NamedNearMiss } from '../data/near-misses'
import { getSite } from '../data/sites'
import { badField, notFound } from './refusal'
import type { Work } from './work'

const toView = ({ id, siteId, site, kind, what, happenedAt, fileIds, reportedAt, reporter, answer, answerer, answeredAt }: NamedNearMiss): NearMissView =>
  ({ id, siteId, site, kind, what, when: happenedAt, fileIds, reportedAt, reporter, answer, answeredBy: answerer, answeredAt })

/**
 * Reports a near miss or an incident, with photos. It takes nothing from who reports it; retraining is the safety
 * manager's to decide. An anonymous one keeps no reporter, neither on itself nor on its photos, nor in the audit trail.
 * 404 for no such site; 422 for a photo that is not one's own, or a time that has not come.
 */
export async function reportNearMiss(work: Work, body: NearMissBody): Promise<NearMissView> {
  const { db, actor, now } = work
  const site = await getSite(db, body.siteId)
  if (!site) throw notFound('site')
  if (compareInstants(body.when, now) > 0) throw badField('when', 'has not come yet')
  const fileIds = [...new Set(body.fileIds ?? [])]
  for (const fileId of fileIds) if ((await findFile(db, fileId))?.ownerId !== actor.personId) throw badField('fileIds', 'holds a file that is not yours')
  const id = randomUUID()
  await db.transaction(async (trx) => {
    await insertNearMiss(trx, { id, siteId: site.id, reporterId: body.anonymous ? null : actor.personId, kind: body.kind, what: body.what, happenedAt: body.when, happenedOn: dateInZone(body.when, site.timeZone), fileIds, reportedAt: now, answer: null, answeredBy: null, answeredAt: null })
    if (body.anonymous) await forgetFileOwners(trx, fileIds)
    await appendAudit(trx, { at: now, actorId: body.anonymous ? null : actor.personId, action: 'nearMiss.reported', subject: { kind: 'nearMiss', id }, after: { siteId: site.id, kind: body.kind } })
  })
  return toView((await listNearMisses(db, { id }))[0]!)
}

/** One's own reports with what was done about them; the safety manager sees all. */
export async function readNearMisses(work: Work) {
  const mayAnswer = can(work.actor, 'nearMiss.answer')
  const reports = await listNearMisses(work.db, mayAnswer ? {} : { reporterId: work.actor.personId })
  return { items: reports.map(toView), mayAnswer }
}

/** Says what was done about a report, to be seen by who sent it. 404 for no such report. */
export async function decideNearMiss(work: Work, id: string, answer: string): Promise<NearMissView> {
  await work.db.transaction(async (trx) => {
    if ((await listNearMisses(trx, { id })).length === 0) throw notFound('report')
    await answerNearMiss(trx, id, { answer, answeredBy: work.actor.personId, answeredAt: work.now })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'nearMiss.answered', subject: { kind: 'nearMiss', id }, after: { answer } })
  })
  return toView((await listNearMisses(work.db, { id }))[0]!)
}
