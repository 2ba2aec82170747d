import { addDays, dayOfWeek, type CalendarDate } from './dates'

/** What can change somebody's clearance on a day. */
export interface ChangeDays {
  credentials: readonly { issuedOn: CalendarDate, judgedOn?: CalendarDate | null, expiresOn: CalendarDate | null, withdrawnOn?: CalendarDate | null }[]
  holds: readonly { from: CalendarDate, to?: CalendarDate | null }[]
  /** Last good days that no stored date shows, such as the end of a recent practice. */
  lastDays: readonly (CalendarDate | null)[]
  hiredOn: CalendarDate
  leftOn: CalendarDate | null
}

/**
 * The days between two dates, both included, on which clearance can change: the day after an expiry, a start, the
 * first and the day after the last day of a hold, a withdrawal, the first and last day of work; and the first date
 * itself. Between two of them nothing changes, so a look-ahead walks these instead of every day.
 */
export function changeDays(people: readonly ChangeDays[], from: CalendarDate, to: CalendarDate, others: readonly CalendarDate[] = []): CalendarDate[] {
  const days = new Set<CalendarDate>([from, ...others])
  const after = (date: CalendarDate | null | undefined) => date && days.add(addDays(date, 1))
  for (const { credentials, holds, lastDays, hiredOn, leftOn } of people) {
    for (const { issuedOn, judgedOn, expiresOn, withdrawnOn } of credentials) {
      days.add(issuedOn)
      if (judgedOn) days.add(judgedOn)
      if (withdrawnOn) days.add(withdrawnOn)
      after(expiresOn)
    }
    for (const hold of holds) {
      days.add(hold.from)
      after(hold.to)
    }
    for (const last of lastDays) after(last)
    days.add(hiredOn)
    if (leftOn) days.add(leftOn)
  }
  return [...days].filter(day => day >= from && day <= to).sort()
}

/** The Monday of a date's week. */
export const weekOf = (date: CalendarDate) => addDays(date, 1 - dayOfWeek(date))
