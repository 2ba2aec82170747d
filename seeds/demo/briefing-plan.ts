import { addDays, type CalendarDate, dayOfWeek, daysBetween } from '../../shared/domain/dates'
import type { WorkTag } from '../../shared/domain/states'
import type { Weather } from '../../shared/schemas/weather'
import type { DemoContext } from './context'
import { worksOn } from './people'
import { createRandom, type Random } from './random'
import { type CrewKey, type DemoPerson, personByKey } from './roster'
import { demoCrews, type demoSites, demoStays, isDuring, mondayOfWeek, peopleOfStay } from './sites-and-crews'

type DemoSite = (typeof demoSites)[number]

/** One past morning at a site. */
export interface PlannedBriefing {
  site: DemoSite
  date: CalendarDate
  foreman: DemoPerson
  expected: DemoPerson[]
  work: WorkTag[]
  weather: Weather
  random: Random
}

/** So many days back there was a briefing every working day; before that the records hold one a week. */
const dailyDays = 29

const workOfCrew: Record<CrewKey, readonly WorkTag[]> = {
  'walls-a': ['stack', 'brace'], 'walls-b': ['stack', 'cut'], 'steel': ['steel', 'brace'], 'pour': ['pour'], 'prairie-walls': ['stack', 'lift'], 'prairie-pour': ['pour', 'unbrace'],
}

/** Mean afternoon temperatures of the high plains by month, °F, as a rough picture. */
const usualF = [38, 42, 51, 60, 70, 82, 88, 86, 77, 63, 49, 39]

function weatherOn(date: CalendarDate, random: Random): Weather {
  const month = Number(date.slice(5, 7))
  const temperatureF = (usualF[month - 1] ?? 60) - 14 + random.between(-8, 8)
  const isWet = random.chance(0.15)
  return { temperatureF, humidity: random.between(25, 70), windMph: random.between(2, 22), sky: isWet ? (temperatureF <= 32 ? 'snow' : 'wet') : 'dry' }
}

function planDay(context: DemoContext, site: DemoSite, date: CalendarDate): PlannedBriefing | null {
  const stays = demoStays.filter(stay => stay.site === site.key && isDuring(context, stay, date))
  const crews = demoCrews.filter(crew => stays.some(stay => stay.crew === crew.key))
  const foremen = crews.map(crew => personByKey(crew.foreman)).filter(one => worksOn(context, one, date))
  const random = createRandom(`briefing ${site.key} ${daysBetween(context.today, date)}`)
  const [first] = foremen
  if (!first) return null
  return {
    site, date, random, foreman: random.chance(0.75) ? first : random.pick(foremen),
    expected: stays.flatMap(peopleOfStay).filter(one => worksOn(context, one, date)),
    work: [...new Set(crews.flatMap(crew => workOfCrew[crew.key]))], weather: weatherOn(date, random),
  }
}

function isBriefingDay(context: DemoContext, date: CalendarDate): boolean {
  const weekday = dayOfWeek(date)
  return daysBetween(date, context.today) <= dailyDays ? weekday <= 5 : weekday === 1
}

/** Every past morning of a site, oldest first; none today. */
export function planBriefings(context: DemoContext, site: DemoSite): PlannedBriefing[] {
  const planned: PlannedBriefing[] = []
  for (let date = mondayOfWeek(context, site.opensInWeek); date < context.today; date = addDays(date, 1)) {
    const day = isBriefingDay(context, date) ? planDay(context, site, date) : null
    if (day) planned.push(day)
  }
  return planned
}
