import type { Db } from '../data/database'
import { dutiesByCrew, listRoster, type RosteredPerson } from '../data/roster'

/** Somebody expected at a site, with the codes of the duties that their crew usually does (none without a crew). */
export type ExpectedPerson = RosteredPerson & { duties: string[] }

/**
 * The people rostered at a site on a calendar date, by name. A person's own assignment beats the crew's;
 * people who are not yet hired, or have left by then, are not expected.
 */
export async function expectedPeople(db: Db, siteId: string, date: string): Promise<ExpectedPerson[]> {
  return withDuties(db, await listRoster(db, { date, siteId }))
}

/** The same for every site at once. */
export async function expectedAnywhere(db: Db, date: string): Promise<ExpectedPerson[]> {
  return withDuties(db, await listRoster(db, { date }))
}

async function withDuties(db: Db, people: RosteredPerson[]): Promise<ExpectedPerson[]> {
  const duties = await dutiesByCrew(db)
  return people.map(person => ({ ...person, duties: (person.crewId ? duties.get(person.crewId) ?? [] : []).map(slot => slot.duty) }))
}
