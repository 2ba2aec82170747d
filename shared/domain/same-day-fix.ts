import type { Clearance } from './clearance'
import { addDays, type CalendarDate } from './dates'
import type { Missing } from './missing'

/** What a person must do today to be cleared for a duty. */
export interface SameDayFix {
  minutes: number
  /** Module slugs, in the order of the rule. */
  modules: string[]
}

/** A craft credential that ran out at most this many days ago can be renewed on the day, because the hands-on was done before. */
export const renewalDays = 30

/**
 * What would clear a person for a duty today, or null when nothing can. Modules cost their minutes and those of
 * their hands-on and assessor; one passed already costs the hands-on alone. A missing outside card, an orientation,
 * a hold, a length of time that is not known: no fix today. A duty without same-day fix (hose, vibrator, pump
 * spotter, telehandler, pour lead) takes only the renewal of what ran out in the last 30 days.
 */
export function sameDayFixOf(
  { clearance, hasSameDayFix, date }: { clearance: Clearance, hasSameDayFix: boolean, date: CalendarDate },
): SameDayFix | null {
  if (clearance.state === 'cleared') return { minutes: 0, modules: [] }
  const steps = clearance.missing.map(missing => stepFor(missing, { hasSameDayFix, date }))
  const known = steps.filter(step => step !== null)
  if (steps.length === 0 || known.length < steps.length) return null
  const minutesOf = new Map(known.map(step => [step.module, step.minutes]))
  return { minutes: [...minutesOf.values()].reduce((sum, minutes) => sum + minutes, 0), modules: [...minutesOf.keys()] }
}

function stepFor(
  { fix, why }: Missing, { hasSameDayFix, date }: { hasSameDayFix: boolean, date: CalendarDate },
): { module: string, minutes: number } | null {
  if (fix.kind !== 'module' && fix.kind !== 'signOff') return null
  if (fix.minutes === null) return null
  const isRenewal = why.kind === 'expired' && why.on !== undefined && why.on >= addDays(date, -renewalDays)
  return hasSameDayFix || isRenewal ? { module: fix.module, minutes: fix.minutes } : null
}
