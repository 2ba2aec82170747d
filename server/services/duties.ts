import { randomUUID } from 'node:crypto'
import type { Page } from '#shared/schemas/common'
import type { NamedListQuery, PreviewQuery } from '#shared/schemas/crews-and-sites'
import type { DutyChanges, DutyView, NewDutyBody, PreviewView } from '#shared/schemas/requirements'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { insertDuty, listDuties, updateDuty } from '../data/duties'
import { matching, toPage } from './paging'
import { saveOrPreview } from './preview'
import { notFound, Refusal } from './refusal'
import type { Work } from './work'

/** A page of the duties, in the order of the wall. */
export async function readDuties(work: Work, query: NamedListQuery): Promise<Page<DutyView>> {
  return toPage(matching(await listDuties(work.db), query.q, duty => [duty.code, duty.name.en, duty.name.es]), query)
}

/** One duty by its id or its code, otherwise 404. */
export async function requireDuty(db: Db, idOrCode: string): Promise<DutyView> {
  const duty = (await listDuties(db)).find(one => one.id === idOrCode || one.code === idOrCode)
  if (!duty) throw notFound('duty')
  return duty
}

/** Adds a duty; 409 when its code is taken. */
export async function addDuty(work: Work, body: NewDutyBody, query: PreviewQuery): Promise<DutyView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    if ((await listDuties(trx)).some(duty => duty.code === body.code)) throw new Refusal('conflict', 'codeTaken', { message: 'Another duty has this code', fields: { code: 'is another duty\'s' } })
    const duty: DutyView = { ...body, id: randomUUID(), recencyMonths: body.recencyMonths ?? null }
    await insertDuty(trx, duty, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'duty.added', subject: { kind: 'duty', id: duty.id }, after: duty })
    return duty
  })
}

/** Changes a duty; its code stays, because others name it by that. */
export async function changeDuty(work: Work, id: string, body: DutyChanges, query: PreviewQuery): Promise<DutyView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    const before = await requireDuty(trx, id)
    await updateDuty(trx, before.id, body)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'duty.changed', subject: { kind: 'duty', id: before.id }, before, after: body })
    return requireDuty(trx, before.id)
  })
}
