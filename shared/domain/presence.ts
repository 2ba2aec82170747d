import { epochSecondsOf, type Instant, instantAtEpochSeconds } from './dates'

/** HMAC-SHA-1 of a message under a key. Passed in, so that these rules run in a browser as well as on the server. */
export type HmacSha1 = (key: Uint8Array, message: Uint8Array) => Uint8Array

/** Seconds for which one code is shown (RFC 6238, X). */
export const stepSeconds = 30

/** Digits of a code. */
export const codeDigits = 6

/** Bytes of a new briefing's secret: as long as the hash, as RFC 4226 section 4 asks. */
export const secretBytes = 20

/** Steps before the present one whose code is still taken: somebody scanned it and walked. */
const STEPS_BACK = 1

/** What a code from a phone is worth. The step is kept with the sign-in. */
export type PresenceCheck = { isRight: true, step: number } | { isRight: false }

/** The number of the 30-second step in which an instant lies, counted from 1970. */
export function stepAt(instant: Instant): number {
  return Math.floor(epochSecondsOf(instant) / stepSeconds)
}

/** The code of a step, with leading zeros (RFC 4226 section 5.3, RFC 6238). */
export function codeOfStep(
  { secret, step, hmac, digits = codeDigits }: { secret: Uint8Array, step: number, hmac: HmacSha1, digits?: number },
): string {
  const digest = hmac(secret, counterBytes(step))
  const offset = (digest.at(-1) ?? 0) & 0x0F
  const part = new DataView(digest.buffer, digest.byteOffset, digest.byteLength).getUint32(offset) & 0x7FFFFFFF
  return String(part % 10 ** digits).padStart(digits, '0')
}

/** The code to show at an instant. */
export function presenceCode({ secret, instant, hmac }: { secret: Uint8Array, instant: Instant, hmac: HmacSha1 }): string {
  return codeOfStep({ secret, step: stepAt(instant), hmac })
}

/**
 * Whether a code is that of the present step or the one before. Blanks inside are ignored ("123 456"); anything
 * but six digits is wrong. Both steps are always compared, digit by digit, so that the time taken tells nothing.
 */
export function checkPresenceCode(
  { code, secret, instant, hmac }: { code: string, secret: Uint8Array, instant: Instant, hmac: HmacSha1 },
): PresenceCheck {
  const digits = code.replace(/\s/g, '')
  if (!/^\d{6}$/.test(digits)) return { isRight: false }
  const present = stepAt(instant)
  const steps = Array.from({ length: STEPS_BACK + 1 }, (_, back) => present - back).filter(step => step >= 0)
  const matching = steps.filter(step => isSameCode(digits, codeOfStep({ secret, step, hmac })))
  const [step] = matching
  return step === undefined ? { isRight: false } : { isRight: true, step }
}

/** The instant at which the next code is shown: when a screen must have fetched it. */
export function validUntil(instant: Instant): Instant {
  return instantAtEpochSeconds((stepAt(instant) + 1) * stepSeconds)
}

/** The first instant at which the code shown at an instant is no longer taken: one step after `validUntil`. */
export function acceptedUntil(instant: Instant): Instant {
  return instantAtEpochSeconds((stepAt(instant) + 1 + STEPS_BACK) * stepSeconds)
}

function counterBytes(step: number): Uint8Array {
  const bytes = new Uint8Array(8)
  new DataView(bytes.buffer).setBigUint64(0, BigInt(step))
  return bytes
}

function isSameCode(first: string, second: string): boolean {
  let difference = first.length ^ second.length
  for (let index = 0; index < first.length; index += 1) difference |= first.charCodeAt(index) ^ second.charCodeAt(index)
  return difference === 0
}
