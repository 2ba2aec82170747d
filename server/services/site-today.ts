import { addDays, dateInZone } from '#shared/domain/dates'
import { morningOf, usualWork } from '#shared/domain/morning'
import type { WorkTag } from '#shared/domain/states'
import type { TodayPerson, TodayView } from '#shared/schemas/today'
import { isCompetentAt } from '../data/allowances'
import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { listBriefings } from '../data/views/briefing-list'
import { mapNames } from '../data/views/names'
import { accessTo } from './briefing-access'
import { type ClearanceBook, openClearanceBook } from './clearance'
import { notFound } from './refusal'
import { type ExpectedPerson, expectedPeople } from './roster'
import { suggestForSite } from './talk-suggestions'
import type { Talks } from './talks'
import type { WeatherInput } from './weather-hazards'
import type { Work } from './work'

interface Asked extends WeatherInput { date?: string, work?: WorkTag[] }

const talksShown = 5
const daysOfLastTalks = 14

function morningOfPerson(person: ExpectedPerson, crew: string | null, book: ClearanceBook, siteId: string): TodayPerson {
  const duties = person.duties.map((duty) => {
    const { state, until, missing } = book.ask(person.id, duty, siteId)
    return { duty, state, until, missing: missing.map(one => ({ ...one, anyOf: [...one.anyOf] })) }
  })
  return { personId: person.id, name: person.name, crew, duties, ...morningOf(duties) }
}

/** Who is expected at a site, what stops whom from the duties their crew does, the day's briefings, and talks. 404 for a site out of reach. */
export async function viewToday(work: Work, siteId: string, asked: Asked, talks: Talks): Promise<TodayView> {
  const { db } = work
  const site = await getSite(db, siteId)
  if (!site || !isWithin((await work.reach()).siteIds, site.id)) throw notFound('site')
  const date = asked.date ?? dateInZone(work.now, site.timeZone)
  const expected = await expectedPeople(db, site.id, date)
  const book = await openClearanceBook(db, { whom: expected.map(person => person.id), date })
  const names = await mapNames(db)
  const people = expected.map(person => morningOfPerson(person, (person.crewId && names.crews.get(person.crewId)) || null, book, site.id))
  const planned = asked.work ?? usualWork([...new Set(expected.flatMap(person => person.duties))])
  const recent = (await listBriefings(db, { siteIds: [site.id], from: addDays(date, -daysOfLastTalks), to: date, page: 1, perPage: 30 })).items
  const briefings = recent.filter(row => row.date === date)
  const mayRun = await accessTo(work, site.id) === 'run'
  return {
    site: { id: site.id, code: site.code, name: site.name, timeZone: site.timeZone }, date,
    expected: people.length, cleared: people.filter(person => person.state === 'cleared').length, asked: people.filter(person => person.state !== null).length,
    people, dutyNames: names.duties, typeNames: names.types, work: planned,
    openBriefing: briefings.find(row => row.state === 'open') ?? null, briefings,
    lastTalks: recent.filter(row => row.date < date).slice(0, 5).map(row => ({ talk: row.talk, title: row.talkTitle, date: row.date })),
    suggestions: (await suggestForSite(work, { ...asked, site: site.id, date, work: planned }, talks)).slice(0, talksShown), mayRun,
    mayAllow: date === dateInZone(work.now, site.timeZone) && await isCompetentAt(db, work.actor.personId, { siteId: site.id, date }),
  }
}
