import { createHmac } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { acceptedUntil, checkPresenceCode, type HmacSha1, presenceCode, stepAt, validUntil } from '#shared/domain/presence'

const hmac: HmacSha1 = (key, message) => new Uint8Array(createHmac('sha1', key).update(message).digest())
const secret = new TextEncoder().encode('12345678901234567890')
const shownAt = '2026-12-01T13:40:00Z'
const code = presenceCode({ secret, instant: shownAt, hmac })
const check = (typed: string, instant: string) => checkPresenceCode({ code: typed, secret, instant, hmac })

describe('a presence code', () => {
  it('is taken in its own step and in the next one', () => {
    expect(check(code, shownAt)).toEqual({ isRight: true, step: stepAt(shownAt) })
    expect(check(code, '2026-12-01T13:40:29.999Z').isRight).toBe(true)
    expect(check(code, '2026-12-01T13:40:30Z')).toEqual({ isRight: true, step: stepAt(shownAt) })
    expect(check(code, '2026-12-01T13:40:59Z').isRight).toBe(true)
  })

  it('is not taken from the step after next, nor before it was shown', () => {
    expect(check(code, '2026-12-01T13:41:00Z')).toEqual({ isRight: false })
    expect(check(code, '2026-12-01T13:39:59Z')).toEqual({ isRight: false })
  })

  it('says until when it is shown and until when it is taken', () => {
    expect(validUntil(shownAt)).toBe('2026-12-01T13:40:30Z')
    expect(validUntil('2026-12-01T13:40:29.999Z')).toBe('2026-12-01T13:40:30Z')
    expect(acceptedUntil(shownAt)).toBe('2026-12-01T13:41:00Z')
    expect(check(code, acceptedUntil(shownAt)).isRight).toBe(false)
  })

  it('may be typed with blanks, and is six digits and nothing else', () => {
    expect(check(`${code.slice(0, 3)} ${code.slice(3)}`, shownAt).isRight).toBe(true)
    for (const typed of ['', '12345', `${code}0`, `-${code.slice(1)}`, 'abcdef', '١٢٣٤٥٦']) expect(check(typed, shownAt)).toEqual({ isRight: false })
  })

  it('of another briefing’s secret is wrong', () => {
    const other = new TextEncoder().encode('another secret, 20 b')
    expect(checkPresenceCode({ code, secret: other, instant: shownAt, hmac })).toEqual({ isRight: false })
  })

  it('keeps its leading zeros', () => {
    const instants = Array.from({ length: 400 }, (_, minute) => `2026-12-01T${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}:00Z`)
    const codes = instants.map(instant => presenceCode({ secret, instant, hmac }))
    expect(codes.every(one => /^\d{6}$/.test(one))).toBe(true)
    expect(codes.filter(one => one.startsWith('0')).length).toBeGreaterThan(10)
  })
})
