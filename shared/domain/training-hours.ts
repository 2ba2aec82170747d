import { Temporal } from 'temporal-polyfill'
import type { Instant } from './dates'

/** When a company keeps required training open, by its own clock: `06:00` to `18:00` on weekdays 1 (Monday) to 7. */
export interface TrainingHours {
  from: string
  to: string
  days: readonly number[]
}

/**
 * The next instant at which training is open, or null when it is open now. Required training is working time, so a
 * company may close it outside hours. Opens on the minute of `from` and closes on the minute of `to`; with no hours
 * it is always open. Where a clock change skips `from`, it opens at the first minute after the gap.
 */
export function opensNextAt(hours: TrainingHours | null, now: Instant, timeZone: string): Instant | null {
  if (!hours) return null
  const here = Temporal.Instant.from(now).toZonedDateTimeISO(timeZone)
  for (let ahead = 0; ahead <= 7; ahead++) {
    const day = here.toPlainDate().add({ days: ahead })
    if (!hours.days.includes(day.dayOfWeek)) continue
    const opens = day.toZonedDateTime({ timeZone, plainTime: hours.from })
    const closes = day.toZonedDateTime({ timeZone, plainTime: hours.to })
    if (Temporal.ZonedDateTime.compare(here, closes) >= 0) continue
    return Temporal.ZonedDateTime.compare(here, opens) >= 0 ? null : opens.toInstant().toString({ smallestUnit: 'millisecond' })
  }
  return null
}
