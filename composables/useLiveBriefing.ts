import type { PresenceView } from '#shared/schemas/briefing'

const pollMilliseconds = 4000

/**
 * Hears what happens at a briefing: server-sent events, or asking again every few seconds while they fail.
 * `onNews` reloads the briefing.
 */
export function useBriefingNews(id: string, onNews: () => Promise<unknown>) {
  const isPolling = ref(false)
  let source: EventSource | null = null
  let timer: ReturnType<typeof setInterval> | undefined

  function poll() {
    if (timer) return
    isPolling.value = true
    timer = setInterval(() => void onNews(), pollMilliseconds)
  }
  function stopPolling() {
    clearInterval(timer)
    timer = undefined
    isPolling.value = false
  }
  onMounted(() => {
    if (typeof EventSource === 'undefined') return poll()
    source = new EventSource(`/api/briefings/${id}/events`)
    source.onopen = stopPolling
    source.onerror = poll
    for (const kind of ['signIn', 'closed', 'sealed']) source.addEventListener(kind, () => void onNews())
  })
  onBeforeUnmount(() => {
    source?.close()
    stopPolling()
  })
  return { isPolling }
}

/** The code of this half minute, fetched again when it changes; `secondsLeft` counts by the server's clock, not the phone's. */
export function usePresenceCode(id: string) {
  const presence = ref<PresenceView | null>(null)
  const secondsLeft = ref(0)
  const hasFailed = ref(false)
  let endsAt = 0
  let timer: ReturnType<typeof setInterval> | undefined
  let isAsking = false

  async function ask() {
    if (isAsking) return
    isAsking = true
    try {
      presence.value = await $fetch<PresenceView>(`/api/briefings/${id}/presence`)
      endsAt = performance.now() + presence.value.secondsLeft * 1000
      hasFailed.value = false
    }
    catch {
      hasFailed.value = true
      endsAt = performance.now() + 3000
    }
    isAsking = false
  }
  function tick() {
    secondsLeft.value = Math.max(0, (endsAt - performance.now()) / 1000)
    if (secondsLeft.value === 0) void ask()
  }
  onMounted(() => {
    tick()
    timer = setInterval(tick, 500)
  })
  onBeforeUnmount(() => clearInterval(timer))
  return { presence, secondsLeft, hasFailed }
}
