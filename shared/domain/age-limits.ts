import { addMonths, type CalendarDate } from './dates'
import type { Bilingual, WorkTag } from './states'

/** Something that people below an age may not do on a site. */
export interface AgeLimit {
  id: string
  /** Years of age below which the limit holds. */
  below: 16 | 18
  what: Bilingual
  /** Duties that the limit closes altogether; `all` closes every duty. */
  duties: readonly string[] | 'all'
  /** Planned work in which the person may not do the named thing. */
  work: readonly WorkTag[]
  source: string
}

/**
 * US federal limits for young workers, from memory: a company checks them against the rules in force, and
 * stricter state rules come first. Only the limits that name a seeded duty close it; the others are shown.
 */
export const ageLimits: readonly AgeLimit[] = [
  {
    id: 'construction', below: 16, duties: 'all', work: [],
    what: { en: 'No construction work under 16', es: 'Nada de trabajo de construcción antes de los 16 años' },
    source: '29 CFR 570.33, from memory',
  },
  {
    id: 'hoisting', below: 18, duties: ['telehandler-operator'], work: ['lift'],
    what: { en: 'No running or riding hoists, forklifts or telehandlers', es: 'No operar ni montarse en malacates, montacargas ni telehandlers' },
    source: '29 CFR 570.58 (Order 7), from memory',
  },
  {
    id: 'driving', below: 18, duties: ['telehandler-operator'], work: ['drive'],
    what: { en: 'No driving at 16 and 17', es: 'No manejar a los 16 ni a los 17 años' },
    source: '29 CFR 570.52 (Order 2), from memory',
  },
  {
    id: 'power-saws', below: 18, duties: [], work: ['cut'],
    what: { en: 'No power saws', es: 'No usar sierras eléctricas ni de motor' },
    source: '29 CFR 570.65 (Order 14), from memory',
  },
  {
    id: 'roofing', below: 18, duties: [], work: [],
    what: { en: 'No work on or about a roof', es: 'No trabajar en el techo ni a su alrededor' },
    source: '29 CFR 570.67 (Order 16), from memory',
  },
  {
    id: 'trenches', below: 18, duties: [], work: [],
    what: { en: 'No work in trenches deeper than 4 ft', es: 'No trabajar en zanjas de más de 4 pies' },
    source: '29 CFR 570.68 (Order 17), from memory',
  },
]

/**
 * The limits that hold for a person on a date. `under18Until` is the day on which the person turns 18: from that
 * day on no limit holds. Null means grown up. The date itself is shown to nobody.
 */
export function ageLimitsOn(under18Until: CalendarDate | null | undefined, date: CalendarDate): readonly AgeLimit[] {
  if (!under18Until || date >= under18Until) return []
  const isUnder16 = date < addMonths(under18Until, -24)
  return ageLimits.filter(limit => limit.below === 18 || isUnder16)
}

/** True when the person is too young for the duty on the date. */
export function isTooYoungFor(duty: string, under18Until: CalendarDate | null | undefined, date: CalendarDate): boolean {
  return ageLimitsOn(under18Until, date).some(limit => limit.duties === 'all' || limit.duties.includes(duty))
}
