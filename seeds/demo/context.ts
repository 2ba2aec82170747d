import type { Knex } from 'knex'
import { addDays, addMinutes, type CalendarDate, dayOfWeek, type Instant, startOfDay } from '../../shared/domain/dates'
import { appendAuditRows, type AuditEntry } from '../../server/data/audit'
import type { Settings } from '../../server/services/settings'

/** What every part of the demo seed works with. Dates hang on `today`, the company's date at the seeding. */
export interface DemoContext {
  knex: Knex
  settings: Settings
  now: Instant
  today: CalendarDate
  /** Monday of this week. */
  monday: CalendarDate
  /** Audit rows gathered from all parts; written at the end in the order in which things happened. */
  audit: AuditEntry[]
}

/** The company's time zone. */
export const companyZone = 'America/Denver'

/** The date itself, or the Friday before it when it falls on a weekend. */
export function weekdayOnOrBefore(date: CalendarDate): CalendarDate {
  return addDays(date, -Math.max(0, dayOfWeek(date) - 5))
}

/** The instant at an hour and minute of a day in a zone; a day on which the clocks change is an hour off, which no one minds here. */
export function instantAt(date: CalendarDate, hour: number, minute: number, timeZone = companyZone): Instant {
  return addMinutes(startOfDay(date, timeZone), hour * 60 + minute)
}

/** When the office wrote something of a day down: that morning, or for what is older, the week in which the company began with its records here. */
export function recordedAt(context: DemoContext, date: CalendarDate): Instant {
  const began = addDays(context.monday, -104 * 7)
  return date < began ? instantAt(began, 9, 30) : instantAt(date, 7, 30)
}

/** The earlier of an instant and now: a record of today is not written in the future. */
export const notAfterNow = (context: DemoContext, instant: Instant): Instant => (instant < context.now ? instant : context.now)

/** Inserts many rows in pieces that fit SQLite's limit of values. */
export async function insertAll(knex: Knex, table: string, rows: readonly object[]): Promise<void> {
  if (rows.length > 0) await knex.batchInsert(table, [...rows], 150)
}

/** Appends the gathered audit rows, oldest first. */
export async function writeAudit(context: DemoContext): Promise<void> {
  const inOrder = [...context.audit].sort((first, second) => (first.at < second.at ? -1 : first.at > second.at ? 1 : 0))
  await appendAuditRows(context.knex, inOrder)
}
