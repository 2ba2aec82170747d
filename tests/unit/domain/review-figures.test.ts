import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { reliabilityOf, scoreBands, wilsonInterval } from '#shared/domain/review-figures'

describe('the interval of a share', () => {
  it('is not told where nothing was served', () => expect(wilsonInterval(0, 0)).toBeNull())

  it('holds the share, stays between 0 and 1, and narrows as more is served', () => {
    fc.assert(fc.property(fc.double({ min: 0, max: 1, noNaN: true }), fc.integer({ min: 1, max: 5000 }), (share, served) => {
      const range = wilsonInterval(share, served)!
      const later = wilsonInterval(share, served * 4)!
      expect(range.low).toBeGreaterThanOrEqual(0)
      expect(range.high).toBeLessThanOrEqual(1)
      expect(range.low).toBeLessThanOrEqual(share + 1e-12)
      expect(range.high).toBeGreaterThanOrEqual(share - 1e-12)
      expect(later.high - later.low).toBeLessThan(range.high - range.low)
    }))
  })
})

describe('the bands of scores', () => {
  it('begin at their lower edge, and the last one holds a full score', () => {
    const bands = scoreBands([{ score: 0, passed: false }, { score: 0.7999, passed: false }, { score: 0.8, passed: true }, { score: 0.1 + 0.7, passed: true }, { score: 1, passed: true }])
    expect(bands.map(band => band.attempts)).toEqual([1, 0, 0, 0, 0, 0, 0, 1, 2, 1])
    expect(bands[8]).toEqual({ from: 80, to: 90, attempts: 2, passed: 2 })
  })

  it('lose nobody', () => {
    fc.assert(fc.property(fc.array(fc.double({ min: 0, max: 1, noNaN: true })), scores =>
      scoreBands(scores.map(score => ({ score, passed: false }))).reduce((sum, band) => sum + band.attempts, 0) === scores.length))
  })
})

describe('the word for an alpha', () => {
  it.each([[null, 500, 'unknown'], [0.9, 29, 'tooFew'], [0.6999, 30, 'low'], [-0.2, 30, 'low'], [0.7, 30, 'fair'], [0.8, 30, 'good']] as const)('of %s over %i attempts is %s', (alpha, attempts, word) => {
    expect(reliabilityOf(alpha, attempts)).toBe(word)
  })
})
