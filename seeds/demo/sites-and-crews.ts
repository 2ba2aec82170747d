import { addDays, type CalendarDate } from '../../shared/domain/dates'
import { companyZone, type DemoContext, insertAll, instantAt } from './context'
import { personId } from './people'
import { demoId } from './random'
import { type CrewKey, type DemoPerson, personByKey, roster } from './roster'

/** A site of the demo company. */
export type SiteKey = 'sagebrush' | 'quarry' | 'linden' | 'depot'

interface DemoSite { key: SiteKey, code: string, name: string, timeZone: string, address: string, superintendent: string, opensInWeek: number }

/** The sites, the first one first in every list. Weeks are counted from this week's Monday. */
export const demoSites: readonly DemoSite[] = [
  { key: 'sagebrush', code: 'sagebrush', name: 'Sagebrush Commons', timeZone: companyZone, address: '410 Sagebrush Loop, Quill Creek, CO', superintendent: 'begaye', opensInWeek: -30 },
  { key: 'quarry', code: 'quarry-lane', name: 'Quarry Lane Townhomes', timeZone: companyZone, address: '1185 Quarry Lane, Sorrel Flat, CO', superintendent: 'begaye', opensInWeek: -104 },
  { key: 'linden', code: 'linden-school', name: 'Linden Prairie School', timeZone: 'America/Chicago', address: '77 County Road 12, Linden Prairie, NE', superintendent: 'vasquez', opensInWeek: -72 },
  { key: 'depot', code: 'depot-row', name: 'Depot Row', timeZone: 'America/Chicago', address: '9 Depot Street, Bellwether, KS', superintendent: 'vasquez', opensInWeek: -35 },
]

/** The stable id of a site. */
export const siteId = (key: SiteKey) => demoId(`site ${key}`)
/** The stable id of a crew. */
export const crewId = (key: CrewKey) => demoId(`crew ${key}`)

interface DemoCrew { key: CrewKey, name: string, foreman: string, sinceWeek: number, usual: Record<string, number> }

const pourSlots = { 'pour-lead': 1, 'hose-hand': 1, 'vibrator-hand': 1, 'wall-watcher': 2, 'pump-spotter': 1 }

/** The crews with the duties that they usually fill. */
export const demoCrews: readonly DemoCrew[] = [
  { key: 'walls-a', name: 'Walls A', foreman: 'zamora', sinceWeek: -104, usual: { 'stacker': 3, 'brace-hand': 2, 'rebar-hand': 1 } },
  { key: 'walls-b', name: 'Walls B', foreman: 'kowalczyk', sinceWeek: -60, usual: { 'stacker': 3, 'brace-hand': 1, 'telehandler-operator': 1 } },
  { key: 'steel', name: 'Steel and braces', foreman: 'arriaga', sinceWeek: -104, usual: { 'rebar-hand': 3, 'brace-hand': 2, 'telehandler-operator': 1 } },
  { key: 'pour', name: 'Pour crew', foreman: 'boyd', sinceWeek: -104, usual: pourSlots },
  { key: 'prairie-walls', name: 'Prairie walls', foreman: 'tran', sinceWeek: -72, usual: { 'stacker': 3, 'brace-hand': 2, 'telehandler-operator': 1 } },
  { key: 'prairie-pour', name: 'Prairie pour', foreman: 'lindqvist', sinceWeek: -72, usual: pourSlots },
]

interface DemoStay { crew?: CrewKey, person?: string, site: SiteKey, fromWeek: number, toWeek?: number }

/** Who works where, in whole weeks: from the Monday of the first to the Sunday before the last; no last one is open-ended. */
export const demoStays: readonly DemoStay[] = [
  { crew: 'walls-a', site: 'quarry', fromWeek: -104, toWeek: -22 },
  { crew: 'walls-a', site: 'sagebrush', fromWeek: -22, toWeek: 10 },
  { crew: 'walls-b', site: 'quarry', fromWeek: -60 },
  { crew: 'steel', site: 'quarry', fromWeek: -104, toWeek: -30 },
  { crew: 'steel', site: 'sagebrush', fromWeek: -30, toWeek: 7 },
  { crew: 'steel', site: 'quarry', fromWeek: 7 },
  { crew: 'pour', site: 'quarry', fromWeek: -104, toWeek: -12 },
  { crew: 'pour', site: 'sagebrush', fromWeek: -12, toWeek: -10 },
  { crew: 'pour', site: 'quarry', fromWeek: -10, toWeek: 2 },
  { crew: 'pour', site: 'sagebrush', fromWeek: 2, toWeek: 4 },
  { crew: 'pour', site: 'quarry', fromWeek: 4 },
  { crew: 'prairie-walls', site: 'linden', fromWeek: -72 },
  { crew: 'prairie-pour', site: 'linden', fromWeek: -72, toWeek: -35 },
  { crew: 'prairie-pour', site: 'depot', fromWeek: -35, toWeek: 3 },
  { crew: 'prairie-pour', site: 'linden', fromWeek: 3, toWeek: 4 },
  { crew: 'prairie-pour', site: 'depot', fromWeek: 4 },
  { person: 'askew', site: 'sagebrush', fromWeek: -20, toWeek: 10 },
  { person: 'mroz', site: 'quarry', fromWeek: -10, toWeek: 6 },
  { person: 'figg', site: 'depot', fromWeek: -30, toWeek: 8 },
]

/** The Monday of a week counted from this one. */
export const mondayOfWeek = (context: DemoContext, week: number): CalendarDate => addDays(context.monday, week * 7)

/** The crew's own people. */
export const crewMembers = (crew: CrewKey): DemoPerson[] => roster.filter(one => one.crew === crew)

/** The people of a stay, whenever they were hired. */
export const peopleOfStay = (stay: DemoStay): DemoPerson[] => (stay.crew ? crewMembers(stay.crew) : [personByKey(stay.person ?? '')])

/** The site where a crew works on a date, or undefined. */
export function siteOfCrew(context: DemoContext, crew: CrewKey, date: CalendarDate): SiteKey | undefined {
  return demoStays.find(stay => stay.crew === crew && isDuring(context, stay, date))?.site
}

/** True when a stay covers a date. */
export function isDuring(context: DemoContext, stay: DemoStay, date: CalendarDate): boolean {
  return mondayOfWeek(context, stay.fromWeek) <= date && (stay.toWeek === undefined || date < mondayOfWeek(context, stay.toWeek))
}

async function seedSites(context: DemoContext): Promise<void> {
  const admin = personId(personByKey('abernathy'))
  for (const [position, site] of demoSites.entries()) {
    const createdAt = instantAt(addDays(mondayOfWeek(context, site.opensInWeek), -10), 9, 15)
    const { name, code, timeZone, address } = site
    await context.knex('sites').insert({ id: siteId(site.key), code, name, timeZone, address, superintendentId: personId(personByKey(site.superintendent)), position, createdAt })
    context.audit.push({ at: createdAt, actorId: admin, action: 'site.created', subject: { kind: 'site', id: siteId(site.key) }, after: { code, name, timeZone, address } })
  }
}

async function seedCrews(context: DemoContext): Promise<void> {
  const duties = new Map<string, string>((await context.knex('duties').select('id', 'code')).map(row => [row.code, row.id]))
  for (const crew of demoCrews) {
    const createdAt = instantAt(addDays(mondayOfWeek(context, crew.sinceWeek), -4), 10, 0)
    const foremanId = personId(personByKey(crew.foreman))
    await context.knex('crews').insert({ id: crewId(crew.key), name: crew.name, foremanId, createdAt })
    await context.knex('crewDuties').insert(Object.entries(crew.usual).map(([code, count]) => ({ crewId: crewId(crew.key), dutyId: duties.get(code), count })))
    await context.knex('people').whereIn('id', crewMembers(crew.key).map(personId)).update({ crewId: crewId(crew.key) })
    context.audit.push({ at: createdAt, actorId: personId(personByKey('abernathy')), action: 'crew.created', subject: { kind: 'crew', id: crewId(crew.key) }, after: { name: crew.name, foremanId } })
  }
}

async function seedStays(context: DemoContext): Promise<void> {
  const rows = demoStays.map((stay, index) => ({
    id: demoId(`assignment ${index}`), personId: stay.person ? personId(personByKey(stay.person)) : null, crewId: stay.crew ? crewId(stay.crew) : null, siteId: siteId(stay.site),
    startsOn: mondayOfWeek(context, stay.fromWeek), endsOn: stay.toWeek === undefined ? null : addDays(mondayOfWeek(context, stay.toWeek), -1),
    createdAt: instantAt(addDays(mondayOfWeek(context, Math.min(stay.fromWeek, 0)), -4), 11, 20),
  }))
  await insertAll(context.knex, 'assignments', rows)
  for (const { id, createdAt, startsOn, endsOn, ...who } of rows) {
    context.audit.push({ at: createdAt, actorId: personId(personByKey('abernathy')), action: 'assignment.created', subject: { kind: 'assignment', id }, after: { ...who, from: startsOn, to: endsOn } })
  }
}

/** Sites, crews with their usual duties, and who works where from two years back to some weeks ahead. */
export async function seedSitesAndCrews(context: DemoContext): Promise<void> {
  await seedSites(context)
  await seedCrews(context)
  await seedStays(context)
}
