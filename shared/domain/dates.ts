import { Temporal } from 'temporal-polyfill'

/** A day on the calendar as `YYYY-MM-DD`, years 0001 to 9999, without a zone. Two of them compare as strings. */
export type CalendarDate = string

/**
 * A moment in UTC as ISO 8601 with `Z`, with or without a fraction of a second.
 * Because the fraction may be missing, compare with `compareInstants`, not as strings.
 */
export type Instant = string

const CALENDAR_DATE = /^(?!0000)\d{4}-\d{2}-\d{2}$/
const INSTANT = /^(?!0000)\d{4}-\d{2}-\d{2}T[0-2]\d:[0-5]\d:[0-5]\d(?:\.\d{1,9})?Z$/
const ZONE_NAME = /^[A-Za-z][A-Za-z0-9_+-]*(?:\/[A-Za-z0-9_+-]+)*$/

/** True for `YYYY-MM-DD` that exists on the calendar: 2028-02-29 does, 2026-02-29 does not. */
export function isCalendarDate(text: string): boolean {
  return CALENDAR_DATE.test(text) && succeeds(() => Temporal.PlainDate.from(text, { overflow: 'reject' }))
}

/** The date itself when it exists; throws a RangeError that names the text when it does not. */
export function parseCalendarDate(text: string): CalendarDate {
  if (!isCalendarDate(text)) throw new RangeError(`Not a calendar date (YYYY-MM-DD): ${text}`)
  return text
}

/** True for an ISO 8601 instant with a trailing `Z`. Offsets and leap seconds are refused. */
export function isInstant(text: string): boolean {
  return INSTANT.test(text) && succeeds(() => Temporal.Instant.from(text))
}

/** The instant itself when it is one; throws a RangeError that names the text when it is not. */
export function parseInstant(text: string): Instant {
  if (!isInstant(text)) throw new RangeError(`Not an instant in UTC (ISO 8601 with Z): ${text}`)
  return text
}

/**
 * Keeps answers about the same days: lists ask for the same few thousand over and over, and the calendar library is
 * thorough rather than fast. Forgets all when it holds `most`.
 */
function remembered<Second extends number | string, Answer>(answer: (first: string, second: Second) => Answer, most = 20_000): (first: string, second: Second) => Answer {
  const known = new Map<string, Answer>()
  return (first, second) => {
    const key = `${first} ${second}`
    const found = known.get(key)
    if (found !== undefined) return found
    const made = answer(first, second)
    if (known.size >= most) known.clear()
    known.set(key, made)
    return made
  }
}
const monthsOn = remembered((date: CalendarDate, months: number) => toText(toPlainDate(date).add({ months }, { overflow: 'constrain' })))
const daysOn = remembered((date: CalendarDate, days: number) => toText(toPlainDate(date).add({ days })))
const daysApart = remembered((from: CalendarDate, to: CalendarDate) => toPlainDate(from).until(toPlainDate(to), { largestUnit: 'day' }).days)

/**
 * The same day of the month, some months on (or back, when negative). A day that does not exist falls back
 * to the month's last day: 31 Jan + 1 = 28 or 29 Feb. Anchor on the first date; chained steps drift.
 */
export function addMonths(date: CalendarDate, months: number): CalendarDate {
  return monthsOn(date, months)
}

/** The date some days on, or back when negative. */
export function addDays(date: CalendarDate, days: number): CalendarDate {
  return daysOn(date, days)
}

/** The last day of the date's month. */
export function endOfMonth(date: CalendarDate): CalendarDate {
  const plain = toPlainDate(date)
  return toText(plain.with({ day: plain.daysInMonth }))
}

/** Whole days from the first date to the second: 0 on the same day, negative when the second is earlier. */
export function daysBetween(from: CalendarDate, to: CalendarDate): number {
  return daysApart(from, to)
}

/** Day of the week, 1 for Monday to 7 for Sunday. */
export function dayOfWeek(date: CalendarDate): number {
  return toPlainDate(date).dayOfWeek
}

/** The date on the wall calendar of a time zone at an instant. Throws a RangeError for an unknown zone. */
export function dateInZone(instant: Instant, timeZone: string): CalendarDate {
  return toText(toInstant(instant).toZonedDateTimeISO(requireZone(timeZone)).toPlainDate())
}

/**
 * The instant at which a day begins in a zone: midnight, or the first moment after it where the clocks
 * jump over midnight.
 */
export function startOfDay(date: CalendarDate, timeZone: string): Instant {
  return toPlainDate(date).toZonedDateTime(requireZone(timeZone)).toInstant().toString()
}

/** The instant of a wall-clock time (`HH:MM`) on a date in a zone; a time that the clocks skip moves forward. Throws on what is no time. */
export function instantAt(date: CalendarDate, time: string, timeZone: string): Instant {
  return Temporal.PlainDate.from(date).toZonedDateTime({ timeZone, plainTime: Temporal.PlainTime.from(time) }).toInstant().toString()
}

/**
 * The end of a day in a zone, half open: the first instant that no longer belongs to it. A day may be 23 or
 * 25 hours long.
 */
export function endOfDay(date: CalendarDate, timeZone: string): Instant {
  return startOfDay(addDays(date, 1), timeZone)
}

/**
 * The first instant at which something that expires on a date is no longer valid in a zone. The expiry date
 * itself is still good, so this is the start of the next day there.
 */
export function firstInstantNotValid(expiresOn: CalendarDate, timeZone: string): Instant {
  return endOfDay(expiresOn, timeZone)
}

/** -1, 0 or 1 as the first instant is before, at or after the second. Fits `Array.prototype.sort`. */
export function compareInstants(first: Instant, second: Instant): -1 | 0 | 1 {
  const order = Temporal.Instant.compare(toInstant(first), toInstant(second))
  return order < 0 ? -1 : order > 0 ? 1 : 0
}

/** The instant some seconds later, or earlier when negative. Whole seconds only. */
export function addSeconds(instant: Instant, seconds: number): Instant {
  return toInstant(instant).add({ seconds }).toString()
}

/** The instant some minutes later, or earlier when negative. Whole minutes only. */
export function addMinutes(instant: Instant, minutes: number): Instant {
  return toInstant(instant).add({ minutes }).toString()
}

/** Whole seconds since 1970-01-01T00:00:00Z, rounded down. */
export function epochSecondsOf(instant: Instant): number {
  return Math.floor(toInstant(instant).epochMilliseconds / 1000)
}

/** The instant at a number of whole seconds since 1970-01-01T00:00:00Z. */
export function instantAtEpochSeconds(seconds: number): Instant {
  return Temporal.Instant.fromEpochMilliseconds(seconds * 1000).toString()
}

/** True for an IANA time zone that this machine knows, by name: `America/Denver` yes, `+05:00` no. */
export function isKnownTimeZone(timeZone: string): boolean {
  return ZONE_NAME.test(timeZone) && succeeds(() => new Intl.DateTimeFormat('en-US', { timeZone }))
}

/** Names already found good. Asking the platform costs more than the date sum itself, and the names are few. */
const zonesSeen = new Set<string>()

function requireZone(timeZone: string): string {
  if (zonesSeen.has(timeZone)) return timeZone
  if (!isKnownTimeZone(timeZone)) throw new RangeError(`Not a known time zone: ${timeZone}`)
  zonesSeen.add(timeZone)
  return timeZone
}

function toPlainDate(date: CalendarDate): Temporal.PlainDate {
  if (!CALENDAR_DATE.test(date)) throw new RangeError(`Not a calendar date (YYYY-MM-DD): ${date}`)
  return Temporal.PlainDate.from(date, { overflow: 'reject' })
}

function toInstant(instant: Instant): Temporal.Instant {
  if (!INSTANT.test(instant)) throw new RangeError(`Not an instant in UTC (ISO 8601 with Z): ${instant}`)
  return Temporal.Instant.from(instant)
}

function toText(date: Temporal.PlainDate): CalendarDate {
  const text = date.toString()
  if (!CALENDAR_DATE.test(text)) throw new RangeError(`Outside the years 0001 to 9999: ${text}`)
  return text
}

function succeeds(attempt: () => unknown): boolean {
  try {
    attempt()
    return true
  }
  catch {
    return false
  }
}
