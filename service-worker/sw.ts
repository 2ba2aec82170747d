import { clientsClaim } from 'workbox-core'
import { cleanupOutdatedCaches, matchPrecache, precacheAndRoute } from 'workbox-precaching'
import { registerRoute } from 'workbox-routing'
import { CacheFirst, NetworkFirst } from 'workbox-strategies'
import { cacheNames, isKeptAnswer, isKeptPage } from '../shared/offline/kept'

declare const self: ServiceWorkerGlobalScope & { __WB_MANIFEST: { url: string, revision: string | null }[] }

/** How long a page waits for a bad network before the kept one is shown. */
const pageTimeoutSeconds = 6

precacheAndRoute(self.__WB_MANIFEST)
cleanupOutdatedCaches()
clientsClaim()
self.addEventListener('message', event => (event.data as { type?: string } | null)?.type === 'SKIP_WAITING' && void self.skipWaiting())

const kept = async (request: Request) => (await caches.open(cacheNames.kept)).match(request.url, { ignoreVary: true })
/** A redirect to the sign-in page or an error is shown, never kept. */
const onlyWhole = { cacheWillUpdate: async ({ response }: { response: Response }) => (response.status === 200 && !response.redirected ? response : null) }

registerRoute(({ request, url, sameOrigin }) => sameOrigin && request.mode === 'navigate' && isKeptPage(url.pathname), new NetworkFirst({
  cacheName: cacheNames.pages, networkTimeoutSeconds: pageTimeoutSeconds, matchOptions: { ignoreVary: true },
  plugins: [onlyWhole, { handlerDidError: async ({ request }) => await kept(request) ?? await matchPrecache('/offline/index.html') }],
}))
registerRoute(({ request, sameOrigin }) => sameOrigin && request.mode === 'navigate', async ({ request }) =>
  fetch(request).catch(async () => await matchPrecache('/offline/index.html') ?? Response.error()))
registerRoute(({ url, sameOrigin, request }) => sameOrigin && request.method === 'GET' && isKeptAnswer(url.pathname), new NetworkFirst({
  cacheName: cacheNames.answers, matchOptions: { ignoreVary: true }, plugins: [onlyWhole, { handlerDidError: ({ request }) => kept(request) }],
}))
registerRoute(({ url, sameOrigin }) => sameOrigin && url.pathname.startsWith('/_nuxt/'), new CacheFirst({ cacheName: cacheNames.assets, matchOptions: { ignoreVary: true }, plugins: [onlyWhole] }))
registerRoute(({ url, sameOrigin }) => sameOrigin && url.pathname.startsWith('/_i18n/'), new CacheFirst({ cacheName: cacheNames.messages, matchOptions: { ignoreVary: true }, plugins: [onlyWhole] }))
