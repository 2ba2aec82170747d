import { describe, expect, it } from 'vitest'
import { TOTP, Secret } from 'otpauth'
import { addSeconds, instantAtEpochSeconds } from '#shared/domain/dates'
import { codeOfStep, presenceCode, stepAt } from '#shared/domain/presence'
import { hmacSha1 as hmac } from '~~/server/services/presence-hmac'

const secret = new TextEncoder().encode('12345678901234567890')

describe('RFC 4226, appendix D', () => {
  it.each([
    [0, '755224'], [1, '287082'], [2, '359152'], [3, '969429'], [4, '338314'],
  ])('counter %i gives %s', (step, code) => {
    expect(codeOfStep({ secret, step, hmac })).toBe(code)
  })
})

describe('RFC 6238, appendix B (SHA-1, 8 digits)', () => {
  it.each([
    [59, '94287082'], [1111111109, '07081804'], [2000000000, '69279037'],
  ])('time %i gives %s', (seconds, code) => {
    expect(codeOfStep({ secret, step: stepAt(instantAtEpochSeconds(seconds)), hmac, digits: 8 })).toBe(code)
  })
})

describe('otpauth 9.5', () => {
  it('gives the same codes for a thousand steps and another secret', () => {
    const bytes = Uint8Array.from({ length: 20 }, (_, index) => (index * 37 + 11) % 256)
    const other = new TOTP({ secret: new Secret({ buffer: bytes.buffer }), algorithm: 'SHA1', digits: 6, period: 30 })
    const start = '2026-12-01T06:40:00Z'
    const differing = Array.from({ length: 1000 }, (_, index) => addSeconds(start, index * 30 + 7))
      .filter(instant => presenceCode({ secret: bytes, instant, hmac }) !== other.generate({ timestamp: Date.parse(instant) }))
    expect(differing).toEqual([])
  })
})
