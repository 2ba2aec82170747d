import { randomUUID } from 'node:crypto'
import { can } from '#shared/access/abilities'
import type { Page } from '#shared/schemas/common'
import type { PreviewQuery } from '#shared/schemas/crews-and-sites'
import type { HoldChanges, HoldsQuery, HoldView, NewHoldBody, PreviewView } from '#shared/schemas/requirements'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { insertHold, listHolds, updateHold, type StoredHold } from '../data/holds'
import { getPerson } from '../data/people'
import { isWithin } from '../data/reach'
import { listRoster } from '../data/roster'
import { toPage } from './paging'
import { saveOrPreview } from './preview'
import { badField, notFound } from './refusal'
import type { Work } from './work'

/** The reason is the safety manager's alone. */
function toView(work: Work, { crewId: _crewId, reason, ...hold }: StoredHold): HoldView {
  return can(work.actor, 'holds.read') ? { ...hold, reason } : hold
}

async function holdsWithinReach(work: Work): Promise<HoldView[]> {
  const { siteIds, crewIds } = await work.reach()
  const all = await listHolds(work.db)
  const led = siteIds === 'all' || siteIds.size === 0 ? [] : (await listRoster(work.db, { date: work.today })).filter(person => siteIds.has(person.siteId))
  const ledIds = new Set([work.actor.personId, ...led.map(person => person.id)])
  return all.filter(hold => siteIds === 'all' || ledIds.has(hold.personId) || isWithin(crewIds, hold.crewId)).map(hold => toView(work, hold))
}

/** A page of the holds within reach, the newest first; reasons for the safety manager only. */
export async function readHolds(work: Work, query: HoldsQuery): Promise<Page<HoldView>> {
  return toPage((await holdsWithinReach(work)).filter(hold => !query.person || hold.personId === query.person), query)
}

/** One hold within reach, otherwise 404. */
export async function readHold(work: Work, id: string): Promise<HoldView> {
  const found = (await holdsWithinReach(work)).find(hold => hold.id === id)
  if (!found) throw notFound('hold')
  return found
}

/** Takes a person off all duties from a day on. The audit trail does not hold the reason. */
export async function addHold(work: Work, body: NewHoldBody, query: PreviewQuery): Promise<HoldView | PreviewView> {
  return saveOrPreview(work, { ...query, from: body.from }, async (trx) => {
    const hold = { ...body, id: randomUUID(), to: body.to ?? null }
    checkDays(hold)
    if (!await getPerson(trx, body.personId)) throw badField('personId', 'no such person', 'unknownPerson')
    await insertHold(trx, { ...hold, createdBy: work.actor.personId }, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'hold.added', subject: { kind: 'hold', id: hold.id }, after: { personId: hold.personId, from: hold.from, to: hold.to } })
    return toView(work, await requireHold(trx, hold.id))
  })
}

/** Moves or ends a hold, or words its reason anew. */
export async function changeHold(work: Work, id: string, body: HoldChanges, query: PreviewQuery): Promise<HoldView | PreviewView> {
  return saveOrPreview(work, { ...query, from: body.from }, async (trx) => {
    const before = await requireHold(trx, id)
    const after = { ...before, ...body }
    checkDays(after)
    await updateHold(trx, after)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'hold.changed', subject: { kind: 'hold', id }, before: { from: before.from, to: before.to }, after: { from: after.from, to: after.to, isReasonChanged: after.reason !== before.reason } })
    return toView(work, await requireHold(trx, id))
  })
}

async function requireHold(db: Db, id: string): Promise<StoredHold> {
  const [found] = await listHolds(db, id)
  if (!found) throw notFound('hold')
  return found
}

function checkDays(hold: { from: string, to: string | null }): void {
  if (hold.to && hold.to < hold.from) throw badField('to', 'is before the first day', 'datesSwapped')
}
