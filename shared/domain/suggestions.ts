import { type CalendarDate, daysBetween } from './dates'
import type { Season, TalkHazard, WorkTag } from './states'

/** What a talk is about. */
export interface TalkTags {
  slug: string
  work: readonly WorkTag[]
  hazards: readonly TalkHazard[]
  seasons: readonly Season[]
}

/** The morning that a talk is looked for. */
export interface SuggestionDay {
  date: CalendarDate
  work: readonly WorkTag[]
  /** Hazards of the day's weather. */
  hazards: readonly TalkHazard[]
}

/** When each talk was last given; a slug that is missing was never given. */
export interface TalkHistory {
  here: ReadonlyMap<string, CalendarDate>
  company: ReadonlyMap<string, CalendarDate>
}

/** A near miss or incident that a talk speaks of. */
export interface RecentNearMiss {
  hazards: readonly TalkHazard[]
  date: CalendarDate
  isHere: boolean
}

/** Why a talk stands where it stands; shown with it. */
export type SuggestionReason
  = | { kind: 'work', tags: WorkTag[] }
    | { kind: 'weather', tags: TalkHazard[] }
    | { kind: 'nearMiss', date: CalendarDate, isHere: boolean }
    | { kind: 'neverHere' }
    | { kind: 'notLately', days: number }
    | { kind: 'justGiven', days: number }
    | { kind: 'rotation' }
    | { kind: 'season' }

/** A talk with its score, the higher the better. */
export interface Suggestion {
  slug: string
  score: number
  reasons: SuggestionReason[]
}

/**
 * Our own weights (company practice, no source): what is done today first, then what the sky brings, then what
 * just happened, then what has not been heard for long. A talk of the last week steps back.
 */
const WEIGHTS = { work: 40, moreWork: 5, weather: 30, nearMissHere: 50, nearMissElsewhere: 25, neverHere: 15, mostForDays: 14, rotation: 10, season: 5, justGiven: -40 } as const
const NEAR_MISS_DAYS = 30
const NOT_LATELY_DAYS = 14
const JUST_GIVEN_DAYS = 6
/** Each talk comes round at least this often in the company. */
const ROTATION_DAYS = 60

/** The season of a date on the northern half of the earth, by whole months. */
export function seasonOf(date: CalendarDate): Season {
  const month = Number(date.slice(5, 7))
  return month === 12 || month <= 2 ? 'winter' : month <= 5 ? 'spring' : month <= 8 ? 'summer' : 'autumn'
}

const scoreOf = (reason: SuggestionReason): number => {
  switch (reason.kind) {
    case 'work': return WEIGHTS.work + WEIGHTS.moreWork * (reason.tags.length - 1)
    case 'weather': return WEIGHTS.weather
    case 'nearMiss': return reason.isHere ? WEIGHTS.nearMissHere : WEIGHTS.nearMissElsewhere
    case 'neverHere': return WEIGHTS.neverHere
    case 'notLately': return Math.min(WEIGHTS.mostForDays, Math.floor(reason.days / 7))
    case 'justGiven': return WEIGHTS.justGiven
    case 'rotation': return WEIGHTS.rotation
    case 'season': return WEIGHTS.season
  }
}

function givenReason(talk: TalkTags, date: CalendarDate, here: TalkHistory['here']): SuggestionReason[] {
  const last = here.get(talk.slug)
  if (last === undefined) return [{ kind: 'neverHere' }]
  const days = daysBetween(last, date)
  if (days <= JUST_GIVEN_DAYS) return [{ kind: 'justGiven', days: Math.max(0, days) }]
  return days >= NOT_LATELY_DAYS ? [{ kind: 'notLately', days }] : []
}

function reasonsFor(talk: TalkTags, day: SuggestionDay, history: TalkHistory, nearMisses: readonly RecentNearMiss[]): SuggestionReason[] {
  const reasons: SuggestionReason[] = []
  const work = talk.work.filter(tag => day.work.includes(tag))
  if (work.length > 0) reasons.push({ kind: 'work', tags: work })
  const weather = talk.hazards.filter(tag => day.hazards.includes(tag))
  if (weather.length > 0) reasons.push({ kind: 'weather', tags: weather })
  const [miss] = nearMisses
    .filter(one => one.hazards.some(tag => talk.hazards.includes(tag)))
    .filter(one => one.date <= day.date && daysBetween(one.date, day.date) <= NEAR_MISS_DAYS)
    .sort((first, second) => Number(second.isHere) - Number(first.isHere) || (first.date < second.date ? 1 : -1))
  if (miss) reasons.push({ kind: 'nearMiss', date: miss.date, isHere: miss.isHere })
  reasons.push(...givenReason(talk, day.date, history.here))
  const lastAnywhere = history.company.get(talk.slug)
  if (lastAnywhere !== undefined && daysBetween(lastAnywhere, day.date) > ROTATION_DAYS) reasons.push({ kind: 'rotation' })
  if (talk.seasons.includes(seasonOf(day.date))) reasons.push({ kind: 'season' })
  return reasons
}

/**
 * Every talk with its score and reasons, best first; equal scores stand by slug, so that the same morning always
 * gives the same list. The foreman may take any of them.
 */
export function suggestTalks(
  { talks, day, history, nearMisses = [] }:
  { talks: readonly TalkTags[], day: SuggestionDay, history: TalkHistory, nearMisses?: readonly RecentNearMiss[] },
): Suggestion[] {
  return talks
    .map((talk) => {
      const reasons = reasonsFor(talk, day, history, nearMisses)
      return { slug: talk.slug, score: reasons.reduce((sum, reason) => sum + scoreOf(reason), 0), reasons }
    })
    .sort((first, second) => second.score - first.score || (first.slug < second.slug ? -1 : 1))
}
