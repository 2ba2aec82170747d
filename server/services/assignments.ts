import { randomUUID } from 'node:crypto'
import type { AssignmentChanges, AssignmentsQuery, AssignmentView, NewAssignmentBody } from '#shared/schemas/crews-and-sites'
import type { Page } from '#shared/schemas/common'
import { deleteAssignment, getAssignment, insertAssignment, listAssignments, listCrewMembers, updateAssignment, type Assignment } from '../data/assignments'
import { appendAudit } from '../data/audit'
import { listCrews } from '../data/crews'
import type { Db } from '../data/database'
import { getPerson } from '../data/people'
import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { toPage } from './paging'
import { badField, notFound, Refusal } from './refusal'
import type { Work } from './work'

/** The assignments that concern the actor: all for managers; of led crews, at led sites, one's own and one's crew's for others. */
async function assignmentsWithinReach(work: Work, span: { from?: string, to?: string } = {}): Promise<Assignment[]> {
  const { siteIds, crewIds } = await work.reach()
  const self = siteIds === 'all' ? undefined : await getPerson(work.db, work.actor.personId)
  return (await listAssignments(work.db, span)).filter(one => isWithin(siteIds, one.siteId) || isWithin(crewIds, one.crewId)
    || one.personId === work.actor.personId || (one.crewId !== null && one.crewId === self?.crewId))
}

/** A page of the assignments within reach, by first day. */
export async function readAssignments(work: Work, query: AssignmentsQuery): Promise<Page<AssignmentView>> {
  const all = await assignmentsWithinReach(work, query)
  return toPage(all.filter(one => (!query.site || one.siteId === query.site) && (!query.crew || one.crewId === query.crew) && (!query.person || one.personId === query.person)), query)
}

/** One assignment within reach, otherwise 404. */
export async function readAssignment(work: Work, id: string): Promise<AssignmentView> {
  const found = (await assignmentsWithinReach(work)).find(one => one.id === id)
  if (!found) throw notFound('assignment')
  return found
}

/** Rosters a person or a crew at a site; 409 `rosteredElsewhere` when somebody would be at two sites on one day. */
export async function addAssignment(work: Work, body: NewAssignmentBody): Promise<AssignmentView> {
  const assignment: Assignment = { id: randomUUID(), personId: body.personId ?? null, crewId: body.crewId ?? null, siteId: body.siteId, from: body.from, to: body.to ?? null }
  await work.db.transaction(async (trx) => {
    if (assignment.personId && !await getPerson(trx, assignment.personId)) throw badField('personId', 'no such person', 'unknownPerson')
    if (assignment.crewId && (await listCrews(trx, work.today, assignment.crewId)).length === 0) throw badField('crewId', 'no such crew', 'unknownCrew')
    await checkAssignment(trx, assignment)
    await insertAssignment(trx, assignment, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'assignment.added', subject: { kind: 'assignment', id: assignment.id }, after: assignment })
  })
  return assignment
}

/** Moves an assignment to another site or other days. */
export async function changeAssignment(work: Work, id: string, body: AssignmentChanges): Promise<AssignmentView> {
  return work.db.transaction(async (trx) => {
    const before = await getAssignment(trx, id)
    if (!before) throw notFound('assignment')
    const after: Assignment = { ...before, ...body }
    await checkAssignment(trx, after)
    await updateAssignment(trx, after)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'assignment.changed', subject: { kind: 'assignment', id }, before, after })
    return after
  })
}

/** Takes somebody off a site again; the trail keeps that it was so. */
export async function removeAssignment(work: Work, id: string): Promise<void> {
  await work.db.transaction(async (trx) => {
    const before = await getAssignment(trx, id)
    if (!before) throw notFound('assignment')
    await deleteAssignment(trx, id)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'assignment.removed', subject: { kind: 'assignment', id }, before })
  })
}

async function checkAssignment(db: Db, assignment: Assignment): Promise<void> {
  if (assignment.to && assignment.to < assignment.from) throw badField('to', 'is before the first day', 'datesSwapped')
  if (!await getSite(db, assignment.siteId)) throw badField('siteId', 'no such site', 'unknownSite')
  const elsewhere = await findElsewhere(db, assignment)
  if (elsewhere) throw new Refusal('conflict', 'rosteredElsewhere', { message: `${elsewhere.name} is at another site on some of these days`, data: elsewhere })
}

/** Whoever would be at two sites on one day: by an own assignment, by the crew's, or as a member of the crew. */
async function findElsewhere(db: Db, assignment: Assignment): Promise<{ name: string, siteId: string, from: string, to: string | null } | undefined> {
  const others = (await listAssignments(db, assignment)).filter(one => one.id !== assignment.id && one.siteId !== assignment.siteId)
  const person = assignment.personId ? await getPerson(db, assignment.personId) : undefined
  const members = assignment.crewId ? new Map((await listCrewMembers(db, assignment.crewId)).map(member => [member.id, member.name])) : new Map<string, string>()
  for (const { personId, crewId, siteId, from, to } of others) {
    const name = person
      ? personId === person.id || (crewId !== null && crewId === person.crewId) ? person.name : undefined
      : crewId !== null && crewId === assignment.crewId ? 'This crew' : personId ? members.get(personId) : undefined
    if (name) return { name, siteId, from, to }
  }
}
