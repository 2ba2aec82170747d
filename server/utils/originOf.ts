import { getRequestURL, type H3Event } from 'h3'

/**
 * The address people use: as configured, otherwise the one that this request came to. For links shown to the person
 * who asked; links in mail use `settings.linkOrigin`, because a request can name any host.
 */
export function originOf(event: H3Event): string {
  return event.context.settings.origin || getRequestURL(event, { xForwardedProto: false, xForwardedHost: false }).origin
}
