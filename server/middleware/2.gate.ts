import { isPublicRoute } from '../services/public-routes'

const changing = new Set(['POST', 'PUT', 'PATCH', 'DELETE'])

/**
 * Denied by default: every API route asks for a session unless it is on the short public list, and every change
 * needs the Origin of the address people use.
 */
export default defineEventHandler((event) => {
  if (!/^\/api(\/|$|\?)/.test(event.path)) return
  setResponseHeader(event, 'cache-control', 'no-store')
  if (!isInternal(event) && changing.has(event.method)) {
    const origin = getHeader(event, 'origin')
    if (origin !== originOf(event)) throw createError({ statusCode: 403, statusMessage: 'Forbidden', message: 'This request came from another address', data: { code: 'wrongOrigin' } })
  }
  if (!event.context.actor && !isPublicRoute(event.method, event.path.split('?')[0]!)) {
    throw createError({ statusCode: 401, statusMessage: 'Unauthorized', message: 'Sign in first', data: { code: 'notSignedIn' } })
  }
})
