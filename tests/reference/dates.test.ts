import { describe, expect, it } from 'vitest'
import { DateTime } from 'luxon'
import { addDays, addMonths, daysBetween, endOfMonth, firstInstantNotValid } from '#shared/domain/dates'

describe('calendar arithmetic against the vectors of tc39/test262 (Temporal)', () => {
  it.each([
    ['2020-02-29', 12, '2021-02-28'],
    ['2020-02-29', 48, '2024-02-29'],
    ['2019-01-31', 1, '2019-02-28'],
    ['2020-01-31', 1, '2020-02-29'],
    ['2021-09-30', 5, '2022-02-28'],
    ['2096-02-29', 48, '2100-02-28'],
  ])('%s + %i months is %s', (date, months, expected) => {
    expect(addMonths(date, months)).toBe(expected)
  })
})

describe('the first instant not valid, from the IANA time zone rules', () => {
  it.each([
    ['2026-03-07', 'America/New_York', '2026-03-08T05:00:00Z'],
    ['2026-11-01', 'America/New_York', '2026-11-02T05:00:00Z'],
    ['2026-12-31', 'Pacific/Kiritimati', '2026-12-31T10:00:00Z'],
    ['2011-12-29', 'Pacific/Apia', '2011-12-30T10:00:00Z'],
  ])('after %s in %s is %s', (date, zone, expected) => {
    expect(firstInstantNotValid(date, zone)).toBe(expected)
  })
})

describe('calendar arithmetic against luxon 3.7, every day of 2024 to 2028', () => {
  const days: string[] = []
  for (let day = DateTime.utc(2024, 1, 1); day.year <= 2028; day = day.plus({ days: 1 })) days.push(day.toFormat('yyyy-MM-dd'))

  it.each([1, 6, 12, 24, 36, 60])('agrees on adding %i months', (months) => {
    const differing = days.filter(day => addMonths(day, months) !== DateTime.fromISO(day, { zone: 'utc' }).plus({ months }).toISODate())
    expect(days).toHaveLength(1827)
    expect(differing).toEqual([])
  })

  it('agrees on month ends, on adding days and on counting them', () => {
    const differing = days.filter((day) => {
      const other = DateTime.fromISO(day, { zone: 'utc' })
      return endOfMonth(day) !== other.endOf('month').toISODate()
        || addDays(day, 60) !== other.plus({ days: 60 }).toISODate()
        || daysBetween('2024-01-01', day) !== other.diff(DateTime.utc(2024, 1, 1), 'days').days
    })
    expect(differing).toEqual([])
  })

  it.each(['America/Denver', 'America/Chicago', 'America/New_York', 'Asia/Tokyo'])('agrees on the end of every day in %s', (zone) => {
    const differing = days.filter((day) => {
      const other = DateTime.fromISO(day, { zone }).plus({ days: 1 }).startOf('day').toUTC()
      return firstInstantNotValid(day, zone) !== other.toISO({ suppressMilliseconds: true })
    })
    expect(differing).toEqual([])
  })
})
