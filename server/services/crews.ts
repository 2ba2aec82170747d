import { randomUUID } from 'node:crypto'
import type { Page } from '#shared/schemas/common'
import type { CrewChanges, CrewView, NamedListQuery, NewCrewBody } from '#shared/schemas/crews-and-sites'
import { appendAudit } from '../data/audit'
import { insertCrew, isCrewNameTaken, listCrews, replaceCrewDuties, updateCrew } from '../data/crews'
import type { Db } from '../data/database'
import { listDuties } from '../data/duties'
import { getPerson } from '../data/people'
import { isWithin } from '../data/reach'
import { matching, toPage } from './paging'
import { badField, notFound, Refusal } from './refusal'
import type { Work } from './work'

/** The crews that concern the actor: all for managers, otherwise those they lead and the one they are in. */
async function crewsWithinReach(work: Work): Promise<CrewView[]> {
  const { crewIds } = await work.reach()
  const own = crewIds === 'all' ? undefined : await getPerson(work.db, work.actor.personId)
  return (await listCrews(work.db, work.today)).filter(crew => isWithin(crewIds, crew.id) || crew.id === own?.crewId)
}

/** A page of the crews within reach, by name. */
export async function readCrews(work: Work, query: NamedListQuery): Promise<Page<CrewView>> {
  return toPage(matching(await crewsWithinReach(work), query.q, crew => [crew.name, crew.foremanName]), query)
}

/** One crew within reach, otherwise 404. */
export async function readCrew(work: Work, id: string): Promise<CrewView> {
  const crew = (await crewsWithinReach(work)).find(one => one.id === id)
  if (!crew) throw notFound('crew')
  return crew
}

/** Adds a crew; 409 when its name is taken. */
export async function addCrew(work: Work, body: NewCrewBody): Promise<CrewView> {
  const id = randomUUID()
  await work.db.transaction(async (trx) => {
    await checkCrew(trx, body)
    await insertCrew(trx, { id, name: body.name, foremanId: body.foremanId ?? null }, work.now)
    if (body.duties) await replaceCrewDuties(trx, id, await toSlots(trx, body.duties))
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'crew.added', subject: { kind: 'crew', id }, after: body })
  })
  return readCrew(work, id)
}

/** Changes a crew; `duties` replaces all its usual slots. */
export async function changeCrew(work: Work, id: string, body: CrewChanges): Promise<CrewView> {
  const before = await readCrew(work, id)
  await work.db.transaction(async (trx) => {
    await checkCrew(trx, body, id)
    const { duties, ...changes } = body
    await updateCrew(trx, id, changes)
    if (duties) await replaceCrewDuties(trx, id, await toSlots(trx, duties))
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'crew.changed', subject: { kind: 'crew', id }, before: { name: before.name, foremanId: before.foremanId, duties: before.duties }, after: body })
  })
  return readCrew(work, id)
}

async function checkCrew(db: Db, body: CrewChanges, id?: string): Promise<void> {
  if (body.name && await isCrewNameTaken(db, body.name, id)) throw new Refusal('conflict', 'nameTaken', { message: 'Another crew has this name', fields: { name: 'is another crew\'s' } })
  if (body.foremanId && !await getPerson(db, body.foremanId)) throw badField('foremanId', 'no such person', 'unknownPerson')
}

async function toSlots(db: Db, slots: { duty: string, count: number }[]): Promise<{ dutyId: string, count: number }[]> {
  const ids = new Map((await listDuties(db)).map(duty => [duty.code, duty.id]))
  const counts = new Map<string, number>()
  for (const [index, { duty, count }] of slots.entries()) {
    const dutyId = ids.get(duty)
    if (!dutyId) throw badField(`duties.${index}.duty`, 'no such duty', 'unknownDuty')
    counts.set(dutyId, (counts.get(dutyId) ?? 0) + count)
  }
  return [...counts].map(([dutyId, count]) => ({ dutyId, count }))
}
