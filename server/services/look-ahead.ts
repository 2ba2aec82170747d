import { crewingOf } from '#shared/domain/crewing'
import { addDays } from '#shared/domain/dates'
import { changeDays, weekOf } from '#shared/domain/look-ahead'
import type { CredentialItem } from '#shared/schemas/credentials'
import type { LookAheadQuery, LookAheadView } from '#shared/schemas/look-ahead'
import { listRosterDays } from '../data/assignments'
import { listCrews, type Crew } from '../data/crews'
import type { Db } from '../data/database'
import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { listCredentialIds, listCredentialsByIds } from '../data/views/credential-list'
import { mapSiteNames } from '../data/views/names'
import { openClearanceBook, type ClearanceBook } from './clearance'
import { toCredentialQuery } from './credentials'
import { notFound } from './refusal'
import { expectedAnywhere, type ExpectedPerson } from './roster'
import type { Work } from './work'

type CrewLine = LookAheadView['crews'][number]
interface Walk { days: string[], rosterOn: (day: string) => readonly ExpectedPerson[], book: ClearanceBook }

async function listEvents(work: Work, query: LookAheadQuery, days: number): Promise<CredentialItem[]> {
  const filters = await toCredentialQuery(work, { within: days, sort: 'expiresOn', ...(query.site && { site: query.site }) })
  const ids = await listCredentialIds(work.db, filters, work.actor.language)
  const items: CredentialItem[] = []
  for (let start = 0; start < ids.length; start += 500) items.push(...await listCredentialsByIds(work.db, ids.slice(start, start + 500), work.today))
  return items
}

function crewingOn(crew: Crew, people: readonly ExpectedPerson[], book: ClearanceBook, day: string, siteId: string) {
  const personIds = people.map(person => person.id)
  const pairs = personIds.flatMap(personId => crew.duties.map(({ duty }) => ({ personId, duty, state: book.askOn(personId, duty, siteId, day).state, fix: null })))
  return crewingOf({ slots: crew.duties, personIds, pairs })
}

/** Who could do a duty of the crew on the first day and no longer can on the day it fails, with what ran out. */
function renewals(crew: Crew, people: readonly ExpectedPerson[], { book, days }: Walk, failsOn: string, siteId: string): CrewLine['renew'] {
  return people.flatMap(person => crew.duties.flatMap(({ duty }) => {
    const then = book.askOn(person.id, duty, siteId, failsOn)
    if (then.state === 'cleared' || book.askOn(person.id, duty, siteId, days[0]!).state !== 'cleared') return []
    const ended = then.missing.filter(missing => missing.why.kind === 'expired')
    const by = ended.map(missing => missing.why.on ?? null).filter(date => date !== null).sort()[0] ?? null
    return [{ personId: person.id, person: person.name, duty, types: [...new Set(ended.flatMap(missing => missing.why.type ?? missing.anyOf))], by }]
  }))
}

function lookAtCrew(crew: Crew, walk: Walk, sites: ReadonlyMap<string, string>, isWanted: (siteId: string) => boolean): CrewLine[] {
  const lines = new Map<string, CrewLine>()
  for (const day of walk.days) {
    const people = walk.rosterOn(day).filter(person => isWanted(person.siteId))
    for (const siteId of new Set(people.map(person => person.siteId))) {
      const line = lines.get(siteId) ?? { crewId: crew.id, name: crew.name, siteId, site: sites.get(siteId) ?? '', firstShortOn: null, short: [], renew: [] }
      lines.set(siteId, line)
      if (line.firstShortOn !== null) continue
      const here = people.filter(person => person.siteId === siteId)
      const { short } = crewingOn(crew, here, walk.book, day, siteId)
      if (short.length > 0) Object.assign(line, { firstShortOn: day, short, renew: renewals(crew, here, walk, day, siteId) })
    }
  }
  return [...lines.values()]
}

/** The rosters between two dates by crew, read once for each day on which one changes. */
async function readRosters(db: Db, from: string, to: string) {
  const starts = [...new Set([from, ...await listRosterDays(db, from, to)])].filter(day => day >= from && day <= to).sort()
  const rosters: Map<string, ExpectedPerson[]>[] = []
  for (const day of starts) {
    const byCrew = new Map<string, ExpectedPerson[]>()
    for (const person of await expectedAnywhere(db, day)) {
      if (person.crewId) byCrew.set(person.crewId, [...byCrew.get(person.crewId) ?? [], person])
    }
    rosters.push(byCrew)
  }
  return {
    starts,
    /** Everybody who is in the crew on some day. */
    everIn: (crewId: string) => new Set(rosters.flatMap(byCrew => (byCrew.get(crewId) ?? []).map(person => person.id))),
    on: (crewId: string, day: string) => rosters[starts.findLastIndex(start => start <= day)]?.get(crewId) ?? [],
  }
}

/**
 * The coming weeks within the actor's reach: whose cards end when, the first day on which each crew can't fill its
 * usual places and what to renew by when to prevent it, and the load on classes by week. Walks the days on which
 * something changes for a crew, not every day. 404 for a site out of reach.
 */
export async function readLookAhead(work: Work, query: LookAheadQuery): Promise<LookAheadView> {
  const { db, today } = work
  const reach = await work.reach()
  if (query.site !== undefined && (!await getSite(db, query.site) || !isWithin(reach.siteIds, query.site))) throw notFound('site')
  const to = addDays(today, query.weeks * 7)
  const crews = (await listCrews(db, today)).filter(crew => isWithin(reach.crewIds, crew.id) && crew.duties.length > 0)
  const rosters = await readRosters(db, today, to)
  const members = new Map(crews.map(crew => [crew.id, [...rosters.everIn(crew.id)]]))
  const whom = [...members.values()].flat()
  const book = await openClearanceBook(db, { whom, date: today })
  const changesOf = (crew: Crew) => changeDays(members.get(crew.id)!.flatMap((id) => {
    const facts = book.factsOf(id)
    if (!facts) return []
    const { person: { hiredOn, leftOn = null }, credentials, holds } = facts
    return [{ credentials, holds, lastDays: crew.duties.map(({ duty }) => book.ask(id, duty, null).until), hiredOn, leftOn }]
  }), today, to, rosters.starts)
  const sites = await mapSiteNames(db)
  const isWanted = (siteId: string) => query.site === undefined || siteId === query.site
  const lines = crews.flatMap(crew => lookAtCrew(crew, { days: changesOf(crew), rosterOn: day => rosters.on(crew.id, day), book }, sites, isWanted))
  const events = (await listEvents(work, query, query.weeks * 7)).map(({ id, personId, person, crew, type, typeName, expiresOn }) => ({ date: expiresOn!, personId, person, crew: crew ?? null, type, typeName, credentialId: id }))
  const weeks = new Map<string, Map<string, number>>()
  for (const { date, type } of events) {
    const types = weeks.get(weekOf(date)) ?? new Map<string, number>()
    weeks.set(weekOf(date), types.set(type, (types.get(type) ?? 0) + 1))
  }
  return {
    from: today, to, events,
    crews: lines.sort((first, second) => (first.firstShortOn ?? '9999').localeCompare(second.firstShortOn ?? '9999') || first.name.localeCompare(second.name)),
    weeks: [...weeks].sort().map(([monday, types]) => ({ monday, types: [...types].map(([type, count]) => ({ type, count })) })),
  }
}
