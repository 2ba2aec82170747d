import { describe, expect, it } from 'vitest'
import { DateTime } from 'luxon'
import { addDays } from '#shared/domain/dates'
import { expiryOf } from '#shared/domain/validity'

const days = Array.from({ length: 1827 }, (_, index) => addDays('2024-01-01', index))

describe('expiry against luxon 3.7, issued on every day of 2024 to 2028', () => {
  it.each([1, 6, 12, 24, 36, 60])('agrees on a period of %i months from the day', (months) => {
    const differing = days.filter(issuedOn =>
      expiryOf({ kind: 'period', months }, issuedOn) !== DateTime.fromISO(issuedOn, { zone: 'utc' }).plus({ months }).toISODate())
    expect(days.at(-1)).toBe('2028-12-31')
    expect(differing).toEqual([])
  })

  it.each([6, 12, 24])('agrees on a period of %i months to the month’s end', (months) => {
    const differing = days.filter(issuedOn =>
      expiryOf({ kind: 'period', months, anchor: 'monthEnd' }, issuedOn)
      !== DateTime.fromISO(issuedOn, { zone: 'utc' }).plus({ months }).endOf('month').toISODate())
    expect(differing).toEqual([])
  })
})

describe('published intervals', () => {
  it('a lift-truck evaluation lasts 3 years, 29 CFR 1910.178(l)(4)(iii)', () => {
    expect(expiryOf({ kind: 'period', months: 36 }, '2026-12-01')).toBe('2029-12-01')
  })

  it('a respirator fit test lasts 12 months, 29 CFR 1910.134(f)(2)', () => {
    expect(expiryOf({ kind: 'period', months: 12 }, '2028-02-29')).toBe('2029-02-28')
  })
})
