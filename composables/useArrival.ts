import type { SessionView } from '#shared/schemas/session'

/** Where somebody goes after signing in: the page they came for, if it is one of ours. */
export function toOwnPath(next: unknown): string {
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) && !next.startsWith('/sign-in') ? next : '/'
}

/** Takes over a new session: who it is, their sites, then on to a page. */
export function useArrival() {
  const session = useSessionStore()
  const place = usePlaceStore()

  async function arrive({ person }: SessionView, to: string) {
    session.person = person
    await place.load()
    await navigateTo(to, { replace: true })
  }
  return { arrive }
}
