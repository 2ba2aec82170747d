interface Sentinel { release: () => Promise<void> }

/** Keeps the screen on while a page is open, where the browser can; nothing happens elsewhere. */
export function useWakeLock() {
  let sentinel: Sentinel | null = null
  async function hold() {
    const { wakeLock } = navigator as Navigator & { wakeLock?: { request: (kind: 'screen') => Promise<Sentinel> } }
    if (document.visibilityState !== 'visible' || !wakeLock) return
    sentinel = await wakeLock.request('screen').catch(() => null)
  }
  onMounted(() => {
    void hold()
    document.addEventListener('visibilitychange', hold)
  })
  onBeforeUnmount(() => {
    document.removeEventListener('visibilitychange', hold)
    void sentinel?.release()
  })
}
