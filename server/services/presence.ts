import { acceptedUntil, checkPresenceCode, presenceCode, validUntil } from '#shared/domain/presence'
import { hmacSha1 } from './presence-hmac'

/** The code that the live screen shows now, when the next one comes, and until when this one is taken. */
export function presenceNow(secret: Uint8Array, now: string): { code: string, validUntil: string, takenUntil: string } {
  return { code: presenceCode({ secret, instant: now, hmac: hmacSha1 }), validUntil: validUntil(now), takenUntil: acceptedUntil(now) }
}

/** The step that a code belongs to (this one or the one before), or null when it is wrong or stale. */
export function stepOfCode(secret: Uint8Array, code: string, now: string): number | null {
  const checked = checkPresenceCode({ code, secret, instant: now, hmac: hmacSha1 })
  return checked.isRight ? checked.step : null
}
