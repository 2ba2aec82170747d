import { addDays, isCalendarDate } from '#shared/domain/dates'

export type DateOrder = 'mdy' | 'dmy'
/** A date as somebody wrote it: known, readable in two ways, or none at all. */
export type WrittenDate = { date: string } | { problem: 'dateOrder' | 'notADate' }

/** The first three letters of the months, English and Spanish. */
const monthOf: Record<string, number> = Object.fromEntries([
  ...['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'].map((word, index) => [word, index + 1] as const),
  ...([['ene', 1], ['abr', 4], ['ago', 8], ['dic', 12]] as const),
])
/** Day 0 of spreadsheets' serial numbers, so that 61 is 1900-03-01 (ECMA-376 part 1, 18.17.4.1: the 1900 date base). */
const serialStart = '1899-12-30'
const [firstSerial, lastSerial] = [20_000, 80_000]

/**
 * Reads `2026-12-01`, `12/1/2026` (also with dots or dashes), `1-Dec-2026`, `Dec 1, 2026`, `1 dic 2026`, and the serial
 * number that a spreadsheet writes for a date; a time after it is left out. Where day and month could be either, the
 * order must be told; it is never guessed. A day over 12 settles it unless that contradicts the order told.
 */
export function readWrittenDate(typed: string, order?: DateOrder): WrittenDate {
  const text = typed.trim().replace(/(?:T|,? )\d{1,2}:\d{2}(?::\d{2}(?:\.\d+)?)?\s*(?:Z|[ap]\.?\s*m\.?)?$/i, '')
  const iso = /^(\d{4})[-/](\d{1,2})[-/](\d{1,2})$/.exec(text)
  if (iso) return checked(iso[1]!, iso[2]!, iso[3]!)
  if (/^\d{5}$/.test(text)) return Number(text) >= firstSerial && Number(text) <= lastSerial ? { date: addDays(serialStart, Number(text)) } : { problem: 'notADate' }
  const worded = /^(\d{1,2})[ -](?:de )?([a-z]{3,})\.?[ -](?:de )?(\d{4})$/i.exec(text) ?? swapped(/^([a-z]{3,})\.? (\d{1,2}),? (\d{4})$/i.exec(text))
  if (worded) return checked(worded[3]!, String(monthOf[worded[2]!.slice(0, 3).toLowerCase()] ?? 0), worded[1]!)
  const parts = /^(\d{1,2})[/.-](\d{1,2})[/.-](\d{4})$/.exec(text)
  if (!parts) return { problem: 'notADate' }
  const [first, second, year] = [parts[1]!, parts[2]!, parts[3]!]
  if (order === 'mdy') return checked(year, first, second)
  if (order === 'dmy') return checked(year, second, first)
  if (Number(first) > 12) return checked(year, second, first)
  if (Number(second) > 12 || first === second) return checked(year, first, second)
  return { problem: 'dateOrder' }
}

const swapped = (found: RegExpExecArray | null) => found && [found[0], found[2], found[1], found[3]]

function checked(year: string, month: string, day: string): WrittenDate {
  const date = `${year}-${month.padStart(2, '0')}-${day.padStart(2, '0')}`
  return isCalendarDate(date) ? { date } : { problem: 'notADate' }
}
