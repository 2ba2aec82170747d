/** Starts the queue of things not yet sent, and forgets what is kept of another person. */
export default defineNuxtPlugin({
  name: 'outbox',
  dependsOn: ['session'],
  setup(app) {
    const outbox = useOutboxStore()
    const session = useSessionStore()
    const forget = async (id: string | undefined) => {
      if (!id) return
      const before = localStorage.getItem('kept-for')
      if (before && before !== id) await forgetKept()
      localStorage.setItem('kept-for', id)
    }
    app.hook('app:mounted', async () => {
      outbox.isOnline = navigator.onLine
      watch(() => session.person?.id, forget, { immediate: true })
      if (!('indexedDB' in window)) return
      await outbox.load().catch(() => undefined)
      await outbox.sendAll()
      window.addEventListener('online', () => {
        outbox.isOnline = true
        void outbox.sendAll()
      })
      window.addEventListener('offline', () => (outbox.isOnline = false))
      document.addEventListener('visibilitychange', () => document.visibilityState === 'visible' && void outbox.sendAll())
      setInterval(() => void outbox.sendAll(), 30_000)
    })
  },
})
