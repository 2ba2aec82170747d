import { describe, expect, it } from 'vitest'
import { ageLimits, ageLimitsOn, isTooYoungFor } from '#shared/domain/age-limits'

describe('the limits for young workers', () => {
  it('end on the day somebody turns 18', () => {
    expect(isTooYoungFor('telehandler-operator', '2027-03-04', '2027-03-03')).toBe(true)
    expect(isTooYoungFor('telehandler-operator', '2027-03-04', '2027-03-04')).toBe(false)
  })

  it('close every duty under 16, and only lifting and driving from then on', () => {
    expect(isTooYoungFor('stacker', '2027-03-04', '2025-03-03')).toBe(true)
    expect(isTooYoungFor('stacker', '2027-03-04', '2025-03-04')).toBe(false)
    expect(isTooYoungFor('telehandler-operator', '2027-03-04', '2025-03-04')).toBe(true)
  })

  it('of somebody who turns 18 on a leap day hold through the day before', () => {
    expect(isTooYoungFor('telehandler-operator', '2028-02-29', '2028-02-28')).toBe(true)
    expect(isTooYoungFor('telehandler-operator', '2028-02-29', '2028-02-29')).toBe(false)
    expect(isTooYoungFor('stacker', '2028-02-29', '2026-02-28')).toBe(false)
  })

  it('hold for nobody without a date', () => {
    expect(ageLimitsOn(null, '2026-12-01')).toEqual([])
    expect(ageLimitsOn(undefined, '2026-12-01')).toEqual([])
  })

  it('name the work that a young hand must not do', () => {
    const work = ageLimitsOn('2027-03-04', '2026-12-01').flatMap(limit => limit.work)
    expect(work).toEqual(['lift', 'drive', 'cut'])
  })

  it('each carry a source that says it is from memory', () => {
    expect(ageLimits.filter(limit => !/^29 CFR 570\.\d+.*from memory$/.test(limit.source))).toEqual([])
  })
})
