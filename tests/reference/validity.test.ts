import { describe, expect, it } from 'vitest'
import { DateTime } from 'luxon'
import { clearanceOf } from '#shared/domain/clearance'
import { addDays, dateInZone, daysBetween } from '#shared/domain/dates'
import { prepareRules } from '#shared/domain/rules'
import { credentialStateOn, expiryOf } from '#shared/domain/validity'

const days = Array.from({ length: 7305 }, (_, index) => addDays('2024-01-01', index))

describe('expiry against luxon 3.7, issued on every day of 2024 to 2043', () => {
  it.each([1, 3, 6, 12, 18, 24, 36, 48, 60])('agrees on a period of %i months from the day', (months) => {
    const differing = days.filter(issuedOn =>
      expiryOf({ kind: 'period', months }, issuedOn) !== DateTime.fromISO(issuedOn, { zone: 'utc' }).plus({ months }).toISODate())
    expect(days.at(-1)).toBe('2043-12-31')
    expect(differing).toEqual([])
  })

  it.each([1, 3, 6, 12, 18, 24, 36, 48, 60])('agrees on a period of %i months to the month’s end', (months) => {
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

/** The last moment of a day and the first of the next, in a zone, by luxon. */
const lastMoment = (day: string, zone: string) => DateTime.fromISO(day, { zone }).endOf('day').toUTC().toISO()!
const firstMoment = (day: string, zone: string) => DateTime.fromISO(day, { zone }).startOf('day').toUTC().toISO()!

describe.each(['America/Denver', 'Pacific/Honolulu', 'Pacific/Auckland'])('in %s, at the edges of the local day', (zone) => {
  const type = { code: 'ladders', validity: { kind: 'period', months: 12 } as const, basis: 'company' as const, leadDays: 60 }
  const rules = prepareRules([{ id: 'r', appliesTo: { everybody: true }, groups: [['ladders']] }])
  // Issued, expires, withdrawn from; leap days among them, and both changes of the clocks of 2028 in Denver and Auckland.
  const cards: [string, string, string | null][] = [
    ['2027-02-28', '2028-02-28', null], ['2028-02-29', '2029-02-28', null], ['2027-02-28', '2028-02-29', null], ['2028-02-29', '2028-12-31', '2028-03-01'],
    ['2026-12-31', '2027-12-31', null], ['2027-03-12', '2028-03-12', '2028-03-12'], ['2027-11-05', '2028-11-05', null], ['2027-04-02', '2028-04-02', '2028-02-29'],
  ]
  it.each(cards)('a card from %s to %s, withdrawn from %s, changes state and clearance at midnight there and at no other moment', (issuedOn, expiresOn, withdrawnOn) => {
    const credential = { id: 'c', type: 'ladders', issuedOn, expiresOn, withdrawnOn, verification: 'verified' as const }
    const expected = (day: string) => {
      const on = DateTime.fromISO(day)
      if (withdrawnOn && on >= DateTime.fromISO(withdrawnOn)) return 'withdrawn'
      if (on < DateTime.fromISO(issuedOn)) return 'notYet'
      const left = DateTime.fromISO(expiresOn).diff(on, 'days').days
      return left < 0 ? 'expired' : left <= 60 ? 'dueSoon' : 'inDate'
    }
    const edges = [issuedOn, expiresOn, addDays(expiresOn, -60), withdrawnOn ?? expiresOn, '2028-02-29'].flatMap(day => [addDays(day, -1), day, addDays(day, 1)])
    for (const day of edges) {
      for (const instant of [firstMoment(day, zone), lastMoment(day, zone)]) {
        const date = dateInZone(instant, zone)
        expect([instant, date]).toEqual([instant, day])
        expect([day, credentialStateOn(credential, type, date)]).toEqual([day, expected(day)])
        const { state, until } = clearanceOf({ person: { id: 'p', hiredOn: '2020-01-06' }, duty: { code: 'stacker', learningBeside: false }, siteId: 's', date, rules, types: new Map([['ladders', type]]), credentials: [credential] })
        const counts = ['inDate', 'dueSoon'].includes(expected(day))
        expect([day, state]).toEqual([day, counts ? 'cleared' : 'notCleared'])
        if (counts) expect(until).toBe(withdrawnOn && withdrawnOn <= expiresOn ? addDays(withdrawnOn, -1) : expiresOn)
      }
    }
    expect(daysBetween(issuedOn, expiresOn)).toBe(DateTime.fromISO(expiresOn, { zone: 'utc' }).diff(DateTime.fromISO(issuedOn, { zone: 'utc' }), 'days').days)
  })
})
