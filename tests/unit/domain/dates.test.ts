import { describe, expect, it } from 'vitest'
import {
  addDays, addMinutes, addMonths, addSeconds, compareInstants, dateInZone, dayOfWeek, daysBetween, endOfDay, endOfMonth,
  epochSecondsOf, firstInstantNotValid, instantAtEpochSeconds, isCalendarDate, isInstant, isKnownTimeZone,
  parseCalendarDate, parseInstant, startOfDay,
} from '#shared/domain/dates'

describe('a calendar date', () => {
  it.each(['2026-12-01', '2028-02-29', '2000-02-29', '0001-01-01', '9999-12-31'])('%s is one', (text) => {
    expect(isCalendarDate(text)).toBe(true)
    expect(parseCalendarDate(text)).toBe(text)
  })

  it.each([
    '2026-02-29', '2100-02-29', '2026-13-01', '2026-00-10', '2026-04-31', '2026-1-1', '26-12-01', '12/01/2026', '',
    '2026-12-01T00:00:00Z', ' 2026-12-01', '2026-12-01\n', '20261201', '0000-01-01', '+002026-01-01',
  ])('%j is none', (text) => {
    expect(isCalendarDate(text)).toBe(false)
    expect(() => parseCalendarDate(text)).toThrow(RangeError)
  })
})

describe('an instant', () => {
  it.each(['2026-12-01T06:40:00Z', '2026-12-01T06:40:00.123Z', '2028-02-29T23:59:59Z'])('%s is one', (text) => {
    expect(isInstant(text)).toBe(true)
    expect(parseInstant(text)).toBe(text)
  })

  it.each([
    '2026-12-01', '2026-12-01T06:40:00', '2026-12-01T06:40:00+00:00', '2026-12-01T24:00:00Z', '2026-02-29T00:00:00Z',
    '2026-12-31T23:59:60Z', '2026-12-01 06:40:00Z', 'now', '',
  ])('%j is none', (text) => {
    expect(isInstant(text)).toBe(false)
    expect(() => parseInstant(text)).toThrow(RangeError)
  })

  it('is compared by time, not by spelling', () => {
    expect(compareInstants('2026-12-01T06:40:00Z', '2026-12-01T06:40:00.000Z')).toBe(0)
    expect(compareInstants('2026-12-01T06:40:00Z', '2026-12-01T06:40:00.500Z')).toBe(-1)
    expect(compareInstants('2026-12-01T06:40:01Z', '2026-12-01T06:40:00.500Z')).toBe(1)
  })

  it('moves by seconds and minutes', () => {
    expect(addSeconds('2026-12-31T23:59:45Z', 30)).toBe('2027-01-01T00:00:15Z')
    expect(addMinutes('2026-03-08T06:50:00Z', 20)).toBe('2026-03-08T07:10:00Z')
    expect(addMinutes('2026-03-08T06:50:00Z', -60)).toBe('2026-03-08T05:50:00Z')
  })

  it('turns into seconds since 1970, rounded down, and back', () => {
    expect(epochSecondsOf('1970-01-01T00:00:59.999Z')).toBe(59)
    expect(epochSecondsOf('2005-03-18T01:58:29Z')).toBe(1111111109)
    expect(instantAtEpochSeconds(1111111109)).toBe('2005-03-18T01:58:29Z')
  })
})

describe('adding months', () => {
  it.each([
    ['2026-01-31', 1, '2026-02-28'],
    ['2028-01-31', 1, '2028-02-29'],
    ['2026-01-30', 1, '2026-02-28'],
    ['2026-01-28', 1, '2026-02-28'],
    ['2026-02-28', 1, '2026-03-28'],
    ['2028-02-29', 12, '2029-02-28'],
    ['2028-02-29', 48, '2032-02-29'],
    ['2026-12-01', 12, '2027-12-01'],
    ['2026-12-31', 2, '2027-02-28'],
    ['2026-03-31', -1, '2026-02-28'],
    ['2026-03-31', 0, '2026-03-31'],
  ])('%s + %i months is %s', (date, months, expected) => {
    expect(addMonths(date, months)).toBe(expected)
  })

  it('is anchored on the first date, so that a short month does not stay short', () => {
    expect(addMonths('2026-01-31', 2)).toBe('2026-03-31')
    expect(addMonths(addMonths('2026-01-31', 1), 1)).toBe('2026-03-28')
  })

  it('refuses to leave the years that four digits can write', () => {
    expect(() => addMonths('9999-12-31', 1)).toThrow(RangeError)
    expect(() => addMonths('2026-02-30', 1)).toThrow(RangeError)
  })
})

describe('days', () => {
  it('are added over month ends and leap days', () => {
    expect(addDays('2026-12-01', 60)).toBe('2027-01-30')
    expect(addDays('2028-02-28', 1)).toBe('2028-02-29')
    expect(addDays('2026-02-28', 1)).toBe('2026-03-01')
    expect(addDays('2026-03-01', -1)).toBe('2026-02-28')
  })

  it('are counted on the calendar, also where a clock change makes a day short', () => {
    expect(daysBetween('2026-12-01', '2027-01-30')).toBe(60)
    expect(daysBetween('2026-12-01', '2026-12-01')).toBe(0)
    expect(daysBetween('2026-12-01', '2026-11-30')).toBe(-1)
    expect(daysBetween('2026-03-07', '2026-03-09')).toBe(2)
    expect(daysBetween('2028-02-28', '2028-03-01')).toBe(2)
  })

  it('know their weekday, Monday first', () => {
    expect(dayOfWeek('2026-12-01')).toBe(2)
    expect(dayOfWeek('2026-12-06')).toBe(7)
  })
})

describe('the end of the month', () => {
  it.each([
    ['2026-12-01', '2026-12-31'], ['2026-12-31', '2026-12-31'], ['2026-02-10', '2026-02-28'], ['2028-02-01', '2028-02-29'],
  ])('of %s is %s', (date, expected) => {
    expect(endOfMonth(date)).toBe(expected)
  })
})

describe('the date at a site', () => {
  it('is the date on that site’s own wall calendar', () => {
    expect(dateInZone('2026-12-01T06:59:59Z', 'America/Denver')).toBe('2026-11-30')
    expect(dateInZone('2026-12-01T07:00:00Z', 'America/Denver')).toBe('2026-12-01')
    expect(dateInZone('2026-12-01T06:00:00Z', 'America/Chicago')).toBe('2026-12-01')
    expect(dateInZone('2026-12-01T15:00:00Z', 'Asia/Tokyo')).toBe('2026-12-02')
    expect(dateInZone('2028-02-29T23:59:59.999Z', 'UTC')).toBe('2028-02-29')
  })

  it('refuses a zone it does not know instead of guessing', () => {
    expect(() => dateInZone('2026-12-01T06:00:00Z', 'America/Atlantis')).toThrow(RangeError)
    expect(() => dateInZone('2026-12-01T06:00:00Z', '-07:00')).toThrow(RangeError)
  })
})

describe('a day at a site', () => {
  it('is 23 hours long when the clocks go forward and 25 when they go back', () => {
    const hours = (date: string) =>
      (epochSecondsOf(endOfDay(date, 'America/New_York')) - epochSecondsOf(startOfDay(date, 'America/New_York'))) / 3600
    expect(hours('2026-03-08')).toBe(23)
    expect(hours('2026-11-01')).toBe(25)
    expect(hours('2026-12-01')).toBe(24)
  })

  it('starts after midnight where the clocks jump over it', () => {
    expect(startOfDay('2018-11-04', 'America/Sao_Paulo')).toBe('2018-11-04T03:00:00Z')
  })

  it('still belongs to what expires on it until its last instant', () => {
    const end = firstInstantNotValid('2026-12-01', 'America/Denver')
    expect(end).toBe('2026-12-02T07:00:00Z')
    expect(dateInZone(addSeconds(end, -1), 'America/Denver')).toBe('2026-12-01')
    expect(dateInZone(end, 'America/Denver')).toBe('2026-12-02')
  })
})

describe('a time zone', () => {
  it.each(['America/Denver', 'America/Argentina/Buenos_Aires', 'UTC', 'Etc/GMT+7', 'Asia/Tokyo'])('%s is known', (zone) => {
    expect(isKnownTimeZone(zone)).toBe(true)
  })

  it.each(['America/Atlantis', '+05:00', '-07:00', '', 'Denver', 'America/', '../etc/passwd'])('%j is not known', (zone) => {
    expect(isKnownTimeZone(zone)).toBe(false)
  })
})
