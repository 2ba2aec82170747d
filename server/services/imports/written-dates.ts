import { isCalendarDate } from '#shared/domain/dates'

export type DateOrder = 'mdy' | 'dmy'
/** A date as somebody wrote it: known, readable in two ways, or none at all. */
export type WrittenDate = { date: string } | { problem: 'dateOrder' | 'notADate' }

/**
 * Reads `2026-12-01` and `12/1/2026` (also with dots or dashes). Where day and month could be either, the order
 * must be told; it is never guessed. A day over 12 settles it unless that contradicts the order told.
 */
export function readWrittenDate(text: string, order?: DateOrder): WrittenDate {
  const iso = /^(\d{4})-(\d{1,2})-(\d{1,2})(?:T.*)?$/.exec(text)
  if (iso) return checked(iso[1]!, iso[2]!, iso[3]!)
  const parts = /^(\d{1,2})[/.-](\d{1,2})[/.-](\d{4})$/.exec(text)
  if (!parts) return { problem: 'notADate' }
  const [first, second, year] = [parts[1]!, parts[2]!, parts[3]!]
  if (order === 'mdy') return checked(year, first, second)
  if (order === 'dmy') return checked(year, second, first)
  if (Number(first) > 12) return checked(year, second, first)
  if (Number(second) > 12 || first === second) return checked(year, first, second)
  return { problem: 'dateOrder' }
}

function checked(year: string, month: string, day: string): WrittenDate {
  const date = `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`
  return isCalendarDate(date) ? { date } : { problem: 'notADate' }
}
