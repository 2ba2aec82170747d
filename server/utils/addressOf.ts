import type { H3Event } from 'h3'

/** The address a request came from, for slow-down only; the proxy's word counts when an origin is configured behind one. */
export function addressOf(event: H3Event): string {
  return getRequestIP(event, { xForwardedFor: event.context.settings.origin !== '' && event.context.settings.hasTls }) ?? 'unknown'
}
