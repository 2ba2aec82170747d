import type { Language, Role } from '#shared/domain/states'
import type { Db } from './database'

/** Somebody rostered at a site on a day. `under18Until` is for the rules only and never leaves the server. */
export interface RosteredPerson {
  id: string
  name: string
  sortName: string
  badge: string
  role: Role
  language: Language
  crewId: string | null
  siteId: string
  hiredOn: string
  leftOn: string | null
  under18Until: string | null
}

/**
 * Everybody rostered on a calendar date and employed on it, at one site or (without `siteId`) anywhere, by name.
 * A person's own assignment beats the crew's.
 */
export async function listRoster(db: Db, options: { date: string, siteId?: string }): Promise<RosteredPerson[]> {
  const { date, siteId } = options
  const own = db('assignments').whereNotNull('personId').where('startsOn', '<=', date).where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date)).select('personId', 'siteId').as('own')
  const ofCrew = db('assignments').whereNotNull('crewId').where('startsOn', '<=', date).where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date)).select('crewId', 'siteId').as('ofCrew')
  const rows = await db('people').leftJoin(own, 'own.personId', 'people.id').leftJoin(ofCrew, 'ofCrew.crewId', 'people.crewId')
    .where('people.hiredOn', '<=', date)
    .where(query => query.whereNull('people.leftOn').orWhere('people.leftOn', '>', date))
    .modify(query => siteId !== undefined && query.whereRaw('people.id in (select person_id from assignments where site_id = :siteId and person_id is not null union select p.id from assignments a join people p on p.crew_id = a.crew_id where a.site_id = :siteId and a.starts_on <= :date and (a.ends_on is null or a.ends_on >= :date))', { siteId, date }))
    .whereRaw(siteId === undefined ? 'coalesce(own.site_id, of_crew.site_id) is not null' : 'coalesce(own.site_id, of_crew.site_id) = ?', siteId === undefined ? [] : [siteId])
    .orderBy(['people.sortName', 'people.id'])
    .select('people.id', 'people.name', 'people.sortName', 'people.badge', 'people.role', 'people.language', 'people.crewId', 'people.hiredOn', 'people.leftOn', 'people.under18Until', db.raw('coalesce(own.site_id, of_crew.site_id) as site_id')) as RosteredPerson[]
  const seen = new Set<string>()
  return rows.filter(row => !seen.has(row.id) && seen.add(row.id))
}

/** The duties that each crew usually does and how many of each, by crew id, in the order of the wall. */
export async function dutiesByCrew(db: Db): Promise<Map<string, { duty: string, count: number }[]>> {
  const rows = await db('crewDuties').join('duties', 'duties.id', 'crewDuties.dutyId').orderBy(['duties.position', 'duties.code']).select('crewDuties.crewId', 'crewDuties.count', 'duties.code')
  const found = new Map<string, { duty: string, count: number }[]>()
  for (const row of rows) {
    const slot = { duty: row.code as string, count: row.count as number }
    const slots = found.get(row.crewId)
    if (slots) slots.push(slot)
    else found.set(row.crewId, [slot])
  }
  return found
}

/** Everybody employed on a date, rostered or not, by name. */
export async function listEmployed(db: Db, date: string): Promise<{ id: string, name: string }[]> {
  return db('people').where('hiredOn', '<=', date).where(query => query.whereNull('leftOn').orWhere('leftOn', '>', date)).orderBy(['sortName', 'id']).select('id', 'name')
}
