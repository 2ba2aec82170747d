import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import {
  countsFrom, credentialStateOn, daysLeft, effectiveCredential, expiryAcrossDuties, expiryForDuty, expiryOf, isCounting,
  isCountingOn, isExpiringWithin, lastCountingDay, printedDateProblem, standingCredential, validityProblem,
  type Validity,
} from '#shared/domain/validity'
import { addDays, addMonths } from '#shared/domain/dates'
import { verifications } from '#shared/domain/states'
import { aCredential, aType } from './builders/credentials'

const yearFromTheDay: Validity = { kind: 'period', months: 12, anchor: 'day' }
const yearToMonthEnd: Validity = { kind: 'period', months: 12, anchor: 'monthEnd' }

describe('the expiry', () => {
  it('of a type that never runs out is no date', () => {
    expect(expiryOf({ kind: 'never' }, '2026-12-01')).toBeNull()
  })

  it.each([
    ['2026-12-01', 12, '2027-12-01'],
    ['2026-01-31', 1, '2026-02-28'],
    ['2028-01-31', 1, '2028-02-29'],
    ['2028-02-29', 12, '2029-02-28'],
    ['2028-02-29', 48, '2032-02-29'],
    ['2027-02-28', 12, '2028-02-28'],
    ['2026-08-31', 6, '2027-02-28'],
    ['2026-12-01', 36, '2029-12-01'],
  ])('issued %s for %i months is %s', (issuedOn, months, expected) => {
    expect(expiryOf({ kind: 'period', months, anchor: 'day' }, issuedOn)).toBe(expected)
    expect(expiryOf({ kind: 'period', months }, issuedOn)).toBe(expected)
  })

  it.each([
    ['2026-12-01', '2027-12-31'], ['2026-12-31', '2027-12-31'], ['2027-02-28', '2028-02-29'], ['2028-02-29', '2029-02-28'],
  ])('issued %s for a year to the month’s end is %s', (issuedOn, expected) => {
    expect(expiryOf(yearToMonthEnd, issuedOn)).toBe(expected)
  })

  it('of a printed type is the date on the card, and must be given', () => {
    expect(expiryOf({ kind: 'printed' }, '2026-12-01', '2028-11-30')).toBe('2028-11-30')
    expect(() => expiryOf({ kind: 'printed' }, '2026-12-01')).toThrow(RangeError)
    expect(() => expiryOf(yearFromTheDay, '2026-12-01', '2028-11-30')).toThrow(RangeError)
  })
})

describe('the date entered by hand', () => {
  it('is needed for printed types, real, and not before the issue', () => {
    expect(printedDateProblem({ kind: 'printed' }, '2026-12-01', null)).toBe('needed')
    expect(printedDateProblem({ kind: 'printed' }, '2026-12-01', '2027-02-29')).toBe('notADate')
    expect(printedDateProblem({ kind: 'printed' }, '2026-12-01', '2026-11-30')).toBe('beforeIssue')
    expect(printedDateProblem({ kind: 'printed' }, '2026-12-01', '2026-12-01')).toBeNull()
  })

  it('is refused where the product computes it', () => {
    expect(printedDateProblem({ kind: 'never' }, '2026-12-01', '2027-12-01')).toBe('refused')
    expect(printedDateProblem(yearFromTheDay, '2026-12-01', '2027-12-01')).toBe('refused')
    expect(printedDateProblem(yearFromTheDay, '2026-12-01')).toBeNull()
  })
})

describe('a type', () => {
  it('whose interval is law may not run to the month’s end', () => {
    expect(validityProblem({ validity: yearToMonthEnd, basis: 'law' })).toBe('monthEndOverrunsLaw')
    expect(validityProblem({ validity: yearFromTheDay, basis: 'law' })).toBeNull()
    expect(validityProblem({ validity: yearToMonthEnd, basis: 'company' })).toBeNull()
  })

  it.each([0, -1, 1.5, 601, Number.NaN])('cannot last %d months', (months) => {
    expect(validityProblem({ validity: { kind: 'period', months }, basis: 'company' })).toBe('monthsOutOfRange')
  })
})

describe('the state of a credential', () => {
  const expiring = aCredential({ issuedOn: '2026-01-15', expiresOn: '2027-01-30' })

  it('is still good on the expiry date and expired the day after', () => {
    expect(credentialStateOn(expiring, aType(), '2027-01-29')).toBe('dueSoon')
    expect(credentialStateOn(expiring, aType(), '2027-01-30')).toBe('dueSoon')
    expect(credentialStateOn(expiring, aType(), '2027-01-31')).toBe('expired')
  })

  it('is still good on a leap day that is its last', () => {
    const leap = aCredential({ expiresOn: '2028-02-29' })
    expect(credentialStateOn(leap, aType(), '2028-02-28')).toBe('dueSoon')
    expect(credentialStateOn(leap, aType(), '2028-02-29')).toBe('dueSoon')
    expect(credentialStateOn(leap, aType(), '2028-03-01')).toBe('expired')
  })

  it('with a lead of 60 days is due soon from 1 December for 30 January, both included', () => {
    expect(credentialStateOn(expiring, aType(), '2026-11-30')).toBe('inDate')
    expect(credentialStateOn(expiring, aType(), '2026-12-01')).toBe('dueSoon')
  })

  it('with a lead of 0 days is due soon on its last day only', () => {
    expect(credentialStateOn(expiring, aType({ leadDays: 0 }), '2027-01-29')).toBe('inDate')
    expect(credentialStateOn(expiring, aType({ leadDays: 0 }), '2027-01-30')).toBe('dueSoon')
  })

  it('is not yet valid before its issue and in date from it', () => {
    expect(credentialStateOn(aCredential(), aType(), '2026-01-14')).toBe('notYet')
    expect(credentialStateOn(aCredential(), aType(), '2026-01-15')).toBe('inDate')
  })

  it('counts from the day on which earlier training was judged adequate', () => {
    const judged = aCredential({ judgedOn: '2026-03-02' })
    expect(countsFrom(judged)).toBe('2026-03-02')
    expect(credentialStateOn(judged, aType(), '2026-03-01')).toBe('notYet')
    expect(credentialStateOn(judged, aType(), '2026-03-02')).toBe('inDate')
    expect(countsFrom(aCredential({ judgedOn: '2025-12-01' }))).toBe('2026-01-15')
  })

  it('is withdrawn from the day of the withdrawal', () => {
    const withdrawn = aCredential({ withdrawnOn: '2026-06-10' })
    expect(credentialStateOn(withdrawn, aType(), '2026-06-09')).toBe('inDate')
    expect(credentialStateOn(withdrawn, aType(), '2026-06-10')).toBe('withdrawn')
    expect(lastCountingDay(withdrawn)).toBe('2026-06-09')
  })

  it('takes the first that fits: rejected, withdrawn, not verified, not yet valid, expired', () => {
    const everything = { withdrawnOn: '2026-02-01', expiresOn: '2026-01-20', issuedOn: '2027-01-01' }
    const on = (changes: object) => credentialStateOn(aCredential(changes), aType(), '2026-03-01')
    expect(on({ ...everything, verification: 'rejected' })).toBe('rejected')
    expect(on({ ...everything, verification: 'unverified' })).toBe('withdrawn')
    expect(on({ ...everything, withdrawnOn: null, verification: 'unverified' })).toBe('unverified')
    expect(on({ ...everything, withdrawnOn: null })).toBe('notYet')
    expect(on({ expiresOn: '2026-02-28' })).toBe('expired')
  })

  it('counts when in date or due soon, and at no other time', () => {
    const states = ['inDate', 'dueSoon', 'expired', 'unverified', 'withdrawn', 'notYet', 'rejected'] as const
    expect(states.filter(isCounting)).toEqual(['inDate', 'dueSoon'])
  })
})

describe('recent practice', () => {
  const module = aType({ code: 'pump-and-hose', module: 'pump-and-hose' })
  const credential = aCredential({ type: 'pump-and-hose', issuedOn: '2026-01-31' })

  it('makes a craft credential expire so long after the last day of doing the duty', () => {
    expect(expiryForDuty(credential, module, { recencyMonths: 6, lastDoneOn: '2026-08-31' })).toBe('2027-02-28')
  })

  it('counts from the issue when the duty was not done since', () => {
    expect(expiryForDuty(credential, module, { recencyMonths: 6, lastDoneOn: null })).toBe('2026-07-31')
    expect(expiryForDuty(credential, module, { recencyMonths: 6, lastDoneOn: '2025-12-01' })).toBe('2026-07-31')
  })

  it('never lengthens the credential’s own life', () => {
    const ending = { ...credential, expiresOn: '2026-09-15' }
    expect(expiryForDuty(ending, module, { recencyMonths: 6, lastDoneOn: '2026-08-31' })).toBe('2026-09-15')
  })

  it('leaves outside cards and other duties alone', () => {
    expect(expiryForDuty(credential, aType(), { recencyMonths: 6, lastDoneOn: null })).toBeNull()
    expect(expiryForDuty(credential, module, { recencyMonths: null, lastDoneOn: null })).toBeNull()
    expect(expiryForDuty(credential, module)).toBeNull()
  })

  it('shows in lists the last day on which the credential counts for some duty', () => {
    const stale = { recencyMonths: 6, lastDoneOn: null }
    expect(expiryAcrossDuties(credential, module, [stale, { recencyMonths: 6, lastDoneOn: '2026-08-31' }])).toBe('2027-02-28')
    expect(expiryAcrossDuties(credential, module, [stale, { recencyMonths: null, lastDoneOn: null }])).toBeNull()
    expect(expiryAcrossDuties(credential, module, [])).toBeNull()
  })
})

describe('the effective credential', () => {
  const older = aCredential({ id: 'a', issuedOn: '2025-03-01', expiresOn: '2027-03-01' })
  const newer = aCredential({ id: 'b', issuedOn: '2026-03-01', expiresOn: '2028-03-01' })

  it('is the counting one that lasts longest, while the older stays in the history', () => {
    expect(effectiveCredential([newer, older], aType(), '2026-12-01')).toBe(newer)
    expect(effectiveCredential([newer, older], aType(), '2026-02-28')).toBe(older)
  })

  it('falls back to the older one when the newer is withdrawn', () => {
    expect(effectiveCredential([older, { ...newer, withdrawnOn: '2026-06-01' }], aType(), '2026-12-01')).toBe(older)
  })

  it('that never expires lasts longest', () => {
    const forever = aCredential({ id: '0', issuedOn: '2024-01-01' })
    expect(effectiveCredential([newer, forever, older], aType(), '2026-12-01')).toBe(forever)
  })

  it('is the newer of two that last equally long, in any order of the list', () => {
    const twin = { ...newer, id: 'c', issuedOn: '2026-04-01' }
    expect(effectiveCredential([twin, newer], aType(), '2026-12-01')).toBe(twin)
    expect(effectiveCredential([newer, twin], aType(), '2026-12-01')).toBe(twin)
  })

  it('of a per-site type counts only at the site it names', () => {
    const orientation = aType({ perSite: true })
    const here = aCredential({ siteId: 'north' })
    expect(effectiveCredential([here], orientation, '2026-12-01', 'north')).toBe(here)
    expect(effectiveCredential([here], orientation, '2026-12-01', 'south')).toBeNull()
    expect(effectiveCredential([here], orientation, '2026-12-01')).toBeNull()
    expect(effectiveCredential([aCredential({ siteId: null })], orientation, '2026-12-01', 'north')).toBeNull()
  })

  it('is none when nothing of the type counts', () => {
    expect(effectiveCredential([aCredential({ type: 'silica' })], aType(), '2026-12-01')).toBeNull()
    expect(effectiveCredential([], aType(), '2026-12-01')).toBeNull()
  })
})

describe('the credential that speaks for a person in a list', () => {
  const old = aCredential({ id: 'a', issuedOn: '2024-11-01', expiresOn: '2025-11-01' })

  it('is the effective one, so that a renewed card is not chased', () => {
    const renewed = aCredential({ id: 'b', issuedOn: '2025-10-20', expiresOn: '2026-12-20' })
    expect(standingCredential([old, renewed], aType(), '2026-12-01')).toBe(renewed)
  })

  it('is the last to run out when none counts any more', () => {
    const older = aCredential({ id: '0', issuedOn: '2023-11-01', expiresOn: '2024-11-01' })
    expect(standingCredential([old, older], aType(), '2026-12-01')).toBe(old)
    expect(standingCredential([aCredential({ verification: 'unverified' })], aType(), '2026-12-01')).toBeNull()
  })
})

describe('days left', () => {
  it('run from today until the expiry', () => {
    expect(daysLeft('2027-01-30', '2026-12-01')).toBe(60)
    expect(daysLeft('2026-12-01', '2026-12-01')).toBe(0)
    expect(daysLeft('2026-11-30', '2026-12-01')).toBe(-1)
    expect(daysLeft(null, '2026-12-01')).toBeNull()
  })

  it('within 60 from 1 December 2026 reach 30 January 2027, both ends included', () => {
    const within = (expiresOn: string | null, includeExpired = false) =>
      isExpiringWithin({ expiresOn, today: '2026-12-01', days: 60, includeExpired })
    expect(within('2026-12-01')).toBe(true)
    expect(within('2027-01-30')).toBe(true)
    expect(within('2027-01-31')).toBe(false)
    expect(within('2026-11-30')).toBe(false)
    expect(within('2026-11-30', true)).toBe(true)
    expect(within('2027-01-31', true)).toBe(false)
    expect(within(null, true)).toBe(false)
  })
})

describe('for any credential and date', () => {
  const day = fc.integer({ min: 0, max: 3000 }).map(days => addDays('2024-01-01', days))
  const credential = fc.record({
    id: fc.constantFrom('a', 'b', 'c'), type: fc.constant('ladders'), issuedOn: day, expiresOn: fc.option(day),
    verification: fc.constantFrom(...verifications), withdrawnOn: fc.option(day), judgedOn: fc.option(day),
  })

  it('the cheap check says the same as the state', () => {
    fc.assert(fc.property(credential, day, (one, date) => {
      expect(isCountingOn(one, date)).toBe(isCounting(credentialStateOn(one, aType(), date)))
    }))
  })

  it('a period ends on the day of issue’s number or earlier in the month, never later', () => {
    fc.assert(fc.property(day, fc.integer({ min: 1, max: 60 }), (issuedOn, months) => {
      const expiresOn = expiryOf({ kind: 'period', months }, issuedOn) ?? ''
      expect(expiresOn.slice(8) <= issuedOn.slice(8)).toBe(true)
      expect(expiresOn.slice(0, 7)).toBe(addMonths(`${issuedOn.slice(0, 7)}-01`, months).slice(0, 7))
    }))
  })
})
