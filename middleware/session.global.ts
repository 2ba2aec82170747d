import type { Ability } from '#shared/access/abilities'

declare module '#app' {
  interface PageMeta {
    /** Answers without a session. */
    public?: boolean
    /** The ability that the page's main thing needs; the server asks again. */
    ability?: Ability
  }
}

/** A courtesy: sends people to the sign-in page and back. The real guard is the server's. */
export default defineNuxtRouteMiddleware((to) => {
  const session = useSessionStore()
  if (to.meta.public || to.matched.length === 0) return
  if (!session.person) return navigateTo({ path: '/sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } })
  if (to.meta.ability && !session.can(to.meta.ability)) return abortNavigation(createError({ statusCode: 404, statusMessage: 'Not Found' }))
})
