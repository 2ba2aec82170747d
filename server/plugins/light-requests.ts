/*
 * With i18n and nuxt-security each request builds a runtime configuration of its own and clones the page rules: on a
 * JSON route that costs more than the route. API routes and built files need neither. This leans on two internals
 * (`event.context.nitro.runtimeConfig`, `event.context.security`); tests/server/audit-and-headers.test.ts keeps watch.
 */
const light = /^\/(api|_nuxt|_fonts|icon)/

export default defineNitroPlugin((nitro) => {
  const runtimeConfig = useRuntimeConfig()
  nitro.hooks.hook('request', (event) => {
    if (!light.test(event.path)) return
    Object.assign(event.context, { nitro: { ...event.context.nitro, runtimeConfig }, security: { rules: {}, route: '' } })
    setResponseHeaders(event, { 'x-content-type-options': 'nosniff', 'referrer-policy': 'same-origin', 'cross-origin-resource-policy': 'same-origin', 'x-frame-options': 'DENY' })
  })
})
