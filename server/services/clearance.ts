import { type Clearance, clearanceOf, type ClearancePerson, credentialsByType, type Hold } from '#shared/domain/clearance'
import { dateInZone } from '#shared/domain/dates'
import type { ModuleMinutes } from '#shared/domain/missing'
import { prepareRules } from '#shared/domain/rules'
import type { Credential } from '#shared/domain/validity'
import type { ClearanceQuery, ClearanceView } from '#shared/schemas/clearance'
import {
  listClearanceDuties, listRules, mapClearancePeople, mapClearanceTypes, mapCredentials, mapHolds, mapLastDutyDays, mapLearning, type Whom,
} from '../data/clearance-facts'
import { mapAllowances } from '../data/allowances'
import { getCompany } from '../data/company'
import type { Db } from '../data/database'
import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { requirePerson } from './people'
import { notFound } from './refusal'
import { expectedAnywhere, expectedPeople } from './roster'
import type { Work } from './work'

/** Everything that clearance on one date needs, loaded once for many questions. */
export interface ClearanceBook {
  date: string
  /** Codes of all duties, in the order of the wall. */
  duties: string[]
  /** May this person do this duty at this site (null: away from any) on the book's date? An unknown person is not cleared. */
  ask: (personId: string, duty: string, siteId: string | null) => Clearance
  /** What the answers about a person rest on; undefined for who is unknown. */
  factsOf: (personId: string) => { person: ClearancePerson, credentials: readonly Credential[], holds: readonly Hold[] } | undefined
  /** The same on a later date, as far as is known on the book's date. */
  askOn: (personId: string, duty: string, siteId: string | null, onDate: string) => Clearance
}

/** Loads rules, types, credentials, holds, recency and learning of some people for a site's date. */
export async function openClearanceBook(db: Db, options: { whom: Whom, date: string, moduleMinutes?: ReadonlyMap<string, ModuleMinutes> }): Promise<ClearanceBook> {
  const { whom, date, moduleMinutes } = options
  const { timeZone } = await getCompany(db)
  const duties = await listClearanceDuties(db)
  const types = await mapClearanceTypes(db)
  const rules = prepareRules(await listRules(db))
  const people = await mapClearancePeople(db, whom)
  const credentials = await mapCredentials(db, whom)
  const held = new Map([...credentials].map(([personId, list]) => [personId, credentialsByType(list)]))
  const holds = await mapHolds(db, whom)
  const lastDays = await mapLastDutyDays(db, whom, date)
  const learning = await mapLearning(db, whom, { timeZone, date })
  const allowances = await mapAllowances(db, date)
  const dutyByCode = new Map(duties.map(duty => [duty.code, duty]))
  const askOn: ClearanceBook['askOn'] = (personId, code, siteId, onDate) => {
    const person = people.get(personId)
    const duty = dutyByCode.get(code)
    if (!person || !duty) return { state: 'notCleared', until: null, missing: [{ anyOf: [], why: { kind: 'notEmployed' }, fix: { kind: 'office' } }], allowedFor: [] }
    return clearanceOf({
      person, duty, siteId, date: onDate, rules, types,
      credentials: held.get(personId) ?? [],
      holds: holds.get(personId),
      allowances: allowances.get(personId),
      learning: learning.get(personId),
      lastDoneOn: lastDays.get(personId)?.get(code),
      moduleMinutes,
    })
  }
  const factsOf: ClearanceBook['factsOf'] = (id) => {
    const person = people.get(id)
    return person && { person, credentials: credentials.get(id) ?? [], holds: holds.get(id) ?? [] }
  }
  return { date, duties: duties.map(duty => duty.code), factsOf, askOn, ask: (personId, code, siteId) => askOn(personId, code, siteId, date) }
}

/** One person as if rostered at the site asked about, otherwise where they are that day, otherwise nowhere. 404 out of reach. */
async function onePerson(work: Work, id: string, { siteId, date }: { siteId: string | undefined, date: string }) {
  const person = await requirePerson(work, id)
  const rostered = (await expectedAnywhere(work.db, date)).find(one => one.id === id)
  return { id, name: person.name, crewId: person.crewId, siteId: siteId ?? rostered?.siteId ?? null, duties: rostered?.duties ?? [] }
}

/**
 * Who may do what on a date: the people rostered at a site (the actor must reach it, otherwise 404), or without a
 * site everybody rostered within reach, each at their own site. Without a duty, every duty is answered.
 */
export async function readClearance(work: Work, query: ClearanceQuery): Promise<ClearanceView> {
  const { db } = work
  const reach = await work.reach()
  const site = query.site === undefined ? undefined : await getSite(db, query.site)
  if (query.site !== undefined && (!site || !isWithin(reach.siteIds, site.id))) throw notFound('site')
  const date = query.date ?? (site ? dateInZone(work.now, site.timeZone) : work.today)
  const expected = query.person !== undefined
    ? [await onePerson(work, query.person, { siteId: site?.id, date })]
    : site
      ? await expectedPeople(db, site.id, date)
      : (await expectedAnywhere(db, date)).filter(person => isWithin(reach.siteIds, person.siteId) || isWithin(reach.crewIds, person.crewId))
  const book = await openClearanceBook(db, { whom: expected.map(person => person.id), date })
  if (query.duty !== undefined && !book.duties.includes(query.duty)) throw notFound('duty')
  const duties = query.duty === undefined ? book.duties : [query.duty]
  return {
    date,
    people: expected.map(person => ({
      personId: person.id, name: person.name, crewId: person.crewId, siteId: person.siteId,
      duties: duties.map((duty) => {
        const { state, until, missing } = book.ask(person.id, duty, person.siteId)
        return { duty, isOfCrew: person.duties.includes(duty), state, until, missing: missing.map(one => ({ ...one, anyOf: [...one.anyOf] })) }
      }),
    })),
  }
}
