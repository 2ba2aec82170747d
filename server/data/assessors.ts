import type { Language } from '#shared/domain/states'
import type { Db } from './database'

/** The modules that somebody is designated to assess on a date: at every site (null) or at one. */
export async function listAssessorDesignations(db: Db, personId: string, date: string): Promise<{ module: string, siteId: string | null }[]> {
  return db('designations').where({ personId, kind: 'assessor' }).where('startsOn', '<=', date)
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date))
    .select('subject as module', 'siteId')
}

/** The sites at which somebody is rostered on a date, by themselves or with their crew. */
export async function listSitesOfPerson(db: Db, personId: string, date: string): Promise<string[]> {
  return db('assignments').where('startsOn', '<=', date)
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date))
    .where(query => query.where({ personId }).orWhereIn('crewId', db('people').where({ id: personId }).whereNotNull('crewId').select('crewId')))
    .distinct().pluck('siteId')
}

/** Somebody's name, and whether they work here on the date; undefined when there is no such person. */
export async function findLearner(db: Db, id: string, date: string): Promise<{ id: string, name: string, isEmployed: boolean } | undefined> {
  const row = await db('people').where({ id }).first('id', 'name', 'hiredOn', 'leftOn')
  return row && { id: row.id, name: row.name, isEmployed: row.hiredOn <= date && (row.leftOn === null || row.leftOn > date) }
}

/** Everybody who works here on the date, by name, with the language they are taught in. */
export async function listEmployedLearners(db: Db, date: string): Promise<{ id: string, name: string, language: Language }[]> {
  return db('people').where('hiredOn', '<=', date).where(query => query.whereNull('leftOn').orWhere('leftOn', '>', date))
    .orderBy(['sortName', 'id']).select('id', 'name', 'language')
}
