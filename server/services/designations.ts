import { randomUUID } from 'node:crypto'
import type { Page } from '#shared/schemas/common'
import type { PreviewQuery } from '#shared/schemas/crews-and-sites'
import type { DesignationChanges, DesignationsQuery, DesignationView, NewDesignationBody, PreviewView } from '#shared/schemas/requirements'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { insertDesignation, listDesignations, updateDesignation } from '../data/designations'
import { getPerson } from '../data/people'
import { isWithin } from '../data/reach'
import { listRoster } from '../data/roster'
import { getSite } from '../data/sites'
import { toPage } from './paging'
import { saveOrPreview } from './preview'
import { badField, notFound } from './refusal'
import type { Work } from './work'

/** The namings that concern the actor: all for managers; one's own, of led crews' people, and at led sites for others. */
async function designationsWithinReach(work: Work): Promise<DesignationView[]> {
  const all = await listDesignations(work.db)
  const { siteIds, crewIds } = await work.reach()
  if (siteIds === 'all') return all
  const led = new Set([work.actor.personId, ...(await listRoster(work.db, { date: work.today })).filter(person => siteIds.has(person.siteId) || isWithin(crewIds, person.crewId)).map(person => person.id)])
  return all.filter(one => led.has(one.personId) || isWithin(siteIds, one.siteId))
}

/** A page of the namings within reach, by name. */
export async function readDesignations(work: Work, query: DesignationsQuery): Promise<Page<DesignationView>> {
  const all = await designationsWithinReach(work)
  return toPage(all.filter(one => (!query.person || one.personId === query.person) && (!query.site || one.siteId === query.site) && (!query.kind || one.kind === query.kind)), query)
}

/** One naming within reach, otherwise 404. */
export async function readDesignation(work: Work, id: string): Promise<DesignationView> {
  const found = (await designationsWithinReach(work)).find(one => one.id === id)
  if (!found) throw notFound('designation')
  return found
}

/** Names a person in writing for a subject. */
export async function addDesignation(work: Work, body: NewDesignationBody, query: PreviewQuery): Promise<DesignationView | PreviewView> {
  return saveOrPreview(work, { ...query, from: body.from }, async (trx) => {
    const row = { ...body, id: randomUUID(), siteId: body.siteId ?? null, to: body.to ?? null }
    await checkDesignation(trx, row)
    await insertDesignation(trx, row, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'designation.added', subject: { kind: 'designation', id: row.id }, after: row })
    return requireDesignation(trx, row.id)
  })
}

/** Changes or ends a naming; the person stays, another person is another naming. */
export async function changeDesignation(work: Work, id: string, body: DesignationChanges, query: PreviewQuery): Promise<DesignationView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    const { name: _name, ...before } = await requireDesignation(trx, id)
    const after = { ...before, ...body }
    await checkDesignation(trx, after)
    await updateDesignation(trx, after)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'designation.changed', subject: { kind: 'designation', id }, before, after: body })
    return requireDesignation(trx, id)
  })
}

async function requireDesignation(db: Db, id: string): Promise<DesignationView> {
  const [found] = await listDesignations(db, id)
  if (!found) throw notFound('designation')
  return found
}

async function checkDesignation(db: Db, row: { personId: string, siteId: string | null, from: string, to: string | null }): Promise<void> {
  if (row.to && row.to < row.from) throw badField('to', 'is before the first day', 'datesSwapped')
  if (!await getPerson(db, row.personId)) throw badField('personId', 'no such person', 'unknownPerson')
  if (row.siteId && !await getSite(db, row.siteId)) throw badField('siteId', 'no such site', 'unknownSite')
}
