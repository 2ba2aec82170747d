import { describe, expect, it } from 'vitest'
import { opensNextAt } from '#shared/domain/training-hours'
import { isReadingCounted, quizMinutes } from '#shared/domain/training-minutes'

const weekdays = { from: '06:00', to: '18:00', days: [1, 2, 3, 4, 5] }
const denver = 'America/Denver'

describe('training hours', () => {
  it.each([
    ['a minute before they open', '2026-12-01T12:59:00Z', '2026-12-01T13:00:00.000Z'],
    ['the minute they open', '2026-12-01T13:00:00Z', null],
    ['a minute before they close', '2026-12-02T00:59:00Z', null],
    ['the minute they close', '2026-12-02T01:00:00Z', '2026-12-02T13:00:00.000Z'],
    ['Friday evening', '2026-12-05T02:00:00Z', '2026-12-07T13:00:00.000Z'],
    ['Sunday', '2026-12-06T18:00:00Z', '2026-12-07T13:00:00.000Z'],
  ])('at %s', (_name, now, opensAt) => {
    expect(opensNextAt(weekdays, now, denver)).toBe(opensAt)
  })

  it('are always open when the company set none', () => {
    expect(opensNextAt(null, '2026-12-06T18:00:00Z', denver)).toBeNull()
  })

  it('open after the gap when the clocks jump over the start', () => {
    expect(opensNextAt({ from: '02:30', to: '18:00', days: [7] }, '2027-03-14T08:00:00Z', denver)).toBe('2027-03-14T09:30:00.000Z')
  })
})

describe('counted minutes', () => {
  it('take every begun minute of a quiz, at least one and at most its time', () => {
    expect(quizMinutes('2026-12-01T13:00:00Z', '2026-12-01T13:00:05Z', 60)).toBe(1)
    expect(quizMinutes('2026-12-01T13:00:00Z', '2026-12-01T13:09:01Z', 60)).toBe(10)
    expect(quizMinutes('2026-12-01T13:00:00Z', '2026-12-01T15:00:00Z', 60)).toBe(60)
  })

  it('take a lesson again only after a fail since, or to renew', () => {
    const at = '2026-12-01T13:00:00Z'
    expect(isReadingCounted({ lastCountedAt: null, lastFailedAt: null, isRenewing: false })).toBe(true)
    expect(isReadingCounted({ lastCountedAt: at, lastFailedAt: null, isRenewing: false })).toBe(false)
    expect(isReadingCounted({ lastCountedAt: at, lastFailedAt: '2026-12-01T12:59:59Z', isRenewing: false })).toBe(false)
    expect(isReadingCounted({ lastCountedAt: at, lastFailedAt: '2026-12-01T13:00:01Z', isRenewing: false })).toBe(true)
    expect(isReadingCounted({ lastCountedAt: at, lastFailedAt: null, isRenewing: true })).toBe(true)
  })
})
