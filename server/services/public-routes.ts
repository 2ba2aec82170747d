/** The routes that answer without a session, each with its reason. Everything else under `/api` asks for one. */
export const publicRoutes = [
  { method: 'GET', path: '/api/health', why: 'monitoring asks without a person' },
  { method: 'GET', path: '/api/server-notes', why: 'the demo banner stands on the sign-in page too' },
  { method: 'GET', path: '/api/openapi.json', why: 'integrators read the description before they have an account' },
  { method: 'GET', path: '/api/setup', why: 'an empty database has nobody who could sign in' },
  { method: 'POST', path: '/api/setup', why: 'an empty database has nobody who could sign in' },
  { method: 'GET', path: '/api/session', why: 'answers 401 itself, and tells a page who is asking' },
  { method: 'POST', path: '/api/session', why: 'this is signing in' },
  { method: 'DELETE', path: '/api/session', why: 'signing out of a session that has just ended is no error' },
  { method: 'GET', path: '/api/join/:token', why: 'a new hire has no secret yet; the link is the proof' },
  { method: 'POST', path: '/api/join/:token', why: 'a new hire has no secret yet; the link is the proof' },
  { method: 'POST', path: '/api/password-resets', why: 'whoever forgot it cannot sign in' },
  { method: 'GET', path: '/api/password-resets/:token', why: 'the page says whether the mailed link is still good' },
  { method: 'POST', path: '/api/password-resets/:token', why: 'the mailed link is the proof' },
  { method: 'GET', path: '/api/checks/cards/:code', why: 'a stranger checks one card' },
  { method: 'GET', path: '/api/checks/types/:code', why: 'the card check says a type\'s name in words; names are no secret' },
  { method: 'GET', path: '/api/checks/keys', why: 'whoever rechecks a card or a sheet by themselves needs the public keys' },
  { method: 'GET', path: '/api/checks/sheets/:hash', why: 'anybody with the link rechecks a sheet' },
  { method: 'GET', path: '/api/sites/by-code/:code', why: 'the poster\'s landing page' },
  { method: 'POST', path: '/api/briefings/:id/admissions', why: 'a phone at the briefing has only the code' },
  { method: 'GET', path: '/api/briefings/:id/admission', why: 'the talk for the browser that was admitted' },
  { method: 'POST', path: '/api/briefings/:id/sign-ins', why: 'the admission is the proof' },
  { method: 'GET', path: '/api/calendar/:token', why: 'calendar programs cannot sign in; the link can be revoked' },
  { method: 'GET', path: '/api/packets/by-link/:token', why: 'a general contractor reads a packet without an account; the link ends and can be revoked' },
  { method: 'GET', path: '/api/packets/by-link/:token/packet.pdf', why: 'the same packet on paper' },
] as const

const patterns = publicRoutes.map(route => ({
  method: route.method,
  pattern: new RegExp(`^${route.path.replace(/[.]/g, '\\.').replace(/:\w+/g, '[^/]+')}/?$`),
}))

/** True when a method and path (without its query) is on the public list. */
export function isPublicRoute(method: string, path: string): boolean {
  const asked = method === 'HEAD' ? 'GET' : method
  return patterns.some(route => route.method === asked && route.pattern.test(path))
}
