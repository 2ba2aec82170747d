import type { H3Event } from 'h3'

/** The address that people use, for links and QR codes: the configured one, otherwise this request's. */
export const originOf = (event: H3Event) => event.context.settings.origin || getRequestURL(event, { xForwardedProto: false, xForwardedHost: false }).origin
