/**
 * Registers the service worker, where the browser has one (https, or this very machine). A new version waits until
 * somebody loads it: `isWaiting` shows the bar, `loadNewVersion` takes it. What is queued lives outside the worker.
 */
export default defineNuxtPlugin({
  name: 'service-worker',
  setup(app) {
    const isWaiting = ref(false)
    let registration: ServiceWorkerRegistration | undefined
    const loadNewVersion = () => registration?.waiting?.postMessage({ type: 'SKIP_WAITING' })

    app.hook('app:mounted', async () => {
      if (!('serviceWorker' in navigator)) return
      registration = await navigator.serviceWorker.register('/sw.js').catch(() => undefined)
      if (!registration) return
      const hadWorker = navigator.serviceWorker.controller !== null
      const look = () => (isWaiting.value = hadWorker && !!registration?.waiting)
      look()
      registration.addEventListener('updatefound', () => registration?.installing?.addEventListener('statechange', look))
      navigator.serviceWorker.addEventListener('controllerchange', () => isWaiting.value && location.reload())
      setInterval(() => navigator.onLine && void registration?.update().catch(() => undefined), 60 * 60 * 1000)
    })
    return { provide: { newVersion: { isWaiting, load: loadNewVersion } } }
  },
})
