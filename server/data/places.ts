import type { Db } from './database'

export interface SitePlace { id: string, code: string, name: string, timeZone: string }

/** Every site in the office's order. */
export const listAllSites = (db: Db): Promise<SitePlace[]> => db('sites').orderBy(['position', 'name']).select('id', 'code', 'name', 'timeZone')

/** Where somebody is rostered on a date, by an assignment of their own or of their crew; their own wins. */
export async function siteIdsOfPersonOn(db: Db, personId: string, date: string): Promise<Set<string>> {
  const rows: { siteId: string, personId: string | null }[] = await db('assignments')
    .where('startsOn', '<=', date)
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date))
    .where(query => query.where({ personId }).orWhereIn('crewId', db('people').where({ id: personId }).whereNotNull('crewId').select('crewId')))
    .select('siteId', 'personId')
  const own = rows.filter(row => row.personId !== null)
  return new Set((own.length > 0 ? own : rows).map(row => row.siteId))
}
