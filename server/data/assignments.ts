import { addDays } from '#shared/domain/dates'
import type { Db } from './database'

export interface Assignment {
  id: string
  personId: string | null
  crewId: string | null
  siteId: string
  from: string
  /** The last day; null while it goes on. */
  to: string | null
}

const columns = ['id', 'personId', 'crewId', 'siteId', 'startsOn as from', 'endsOn as to'].map(name => `assignments.${name}`)

/** One assignment, or undefined. */
export async function getAssignment(db: Db, id: string): Promise<Assignment | undefined> {
  return db('assignments').where({ id }).first(...columns)
}

/** Assignments that touch the days `from` to `to` (both included, either may be open), by first day. */
export async function listAssignments(db: Db, span: { from?: string, to?: string | null } = {}): Promise<Assignment[]> {
  return db('assignments').modify((query) => {
    if (span.to) query.where('startsOn', '<=', span.to)
    if (span.from) query.where(any => any.whereNull('endsOn').orWhere('endsOn', '>=', span.from!))
  }).orderBy(['startsOn', 'id']).select(...columns)
}

/** Adds an assignment. */
export async function insertAssignment(db: Db, { from, to, ...assignment }: Assignment, now: string): Promise<void> {
  await db('assignments').insert({ ...assignment, startsOn: from, endsOn: to, createdAt: now })
}

/** Writes an assignment's site and days. */
export async function updateAssignment(db: Db, { id, siteId, from, to }: Assignment): Promise<void> {
  await db('assignments').where({ id }).update({ siteId, startsOn: from, endsOn: to })
}

/** Takes an assignment away. */
export async function deleteAssignment(db: Db, id: string): Promise<void> {
  await db('assignments').where({ id }).delete()
}

/** Ids of a crew's people, or the crew of a person, for the rule of one site a day. */
export async function listCrewMembers(db: Db, crewId: string): Promise<{ id: string, name: string }[]> {
  return db('people').where({ crewId }).select('id', 'name')
}

/** The days between two dates on which a roster changes: the first day of an assignment or of somebody's work, and the day after the last. */
export async function listRosterDays(db: Db, from: string, to: string): Promise<string[]> {
  const rows: { startsOn: string, endsOn: string | null }[] = await db('assignments').where('startsOn', '<=', to).where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', from)).distinct('startsOn', 'endsOn')
  const hired: string[] = await db('people').whereBetween('hiredOn', [from, to]).distinct().pluck('hiredOn')
  const left: string[] = await db('people').whereBetween('leftOn', [from, to]).distinct().pluck('leftOn')
  return [...new Set([...rows.flatMap(row => [row.startsOn, ...(row.endsOn ? [addDays(row.endsOn, 1)] : [])]), ...hired, ...left])]
}
