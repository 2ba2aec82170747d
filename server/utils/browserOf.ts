import type { H3Event } from 'h3'
import { randomToken, sha256 } from '../services/hashing'

const cookieName = 'browser'

/** The hash that stands for this browser at a briefing, or undefined when it has no cookie yet. */
export function getBrowserHash(event: H3Event): string | undefined {
  const cookie = getCookie(event, cookieName)
  return cookie && /^[\w-]{20,64}$/.test(cookie) ? sha256(cookie) : undefined
}

/** The same, giving the browser its cookie when it has none: for counting wrong codes and binding admissions only. */
export function requireBrowserHash(event: H3Event): string {
  const known = getBrowserHash(event)
  if (known) return known
  const token = randomToken()
  setCookie(event, cookieName, token, { httpOnly: true, sameSite: 'lax', secure: event.context.settings.hasTls, path: '/', maxAge: 60 * 60 * 24 * 180 })
  return sha256(token)
}
