/** Reads a part of the page with the device's own voice, in the page's language unless said; `isAvailable` only where it has one. */
export function useReadAloud(part: () => HTMLElement | null, language?: () => 'en' | 'es') {
  const { locale } = useI18n()
  const isAvailable = ref(false)
  const isReading = ref(false)

  function stop() {
    if (!isAvailable.value) return
    speechSynthesis.cancel()
    isReading.value = false
  }
  /** One utterance a paragraph: some voices stop by themselves in the middle of a long one. */
  function start() {
    const texts = [...part()?.querySelectorAll('h1, h2, p, li, label, figcaption') ?? []].filter(node => !node.parentElement?.closest('li, label, figcaption')).map(node => node.textContent?.trim() ?? '').filter(Boolean)
    stop()
    texts.forEach((text, index) => {
      const words = new SpeechSynthesisUtterance(text)
      words.lang = (language?.() ?? locale.value) === 'es' ? 'es-US' : 'en-US'
      if (index === texts.length - 1) words.onend = () => (isReading.value = false)
      speechSynthesis.speak(words)
    })
    isReading.value = texts.length > 0
  }

  onMounted(() => (isAvailable.value = 'speechSynthesis' in window))
  onBeforeUnmount(stop)
  return { isAvailable, isReading, toggle: () => (isReading.value ? stop() : start()) }
}
