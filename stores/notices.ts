/** Short words that tell what just happened, announced to screen readers. */
export const useNoticesStore = defineStore('notices', () => {
  const notices = ref<{ id: number, text: string, kind: 'done' | 'problem' }[]>([])
  let next = 1

  function drop(id: number) {
    notices.value = notices.value.filter(notice => notice.id !== id)
  }
  /** Shows `text` for some seconds; a problem stays until it is closed. */
  function say(text: string, kind: 'done' | 'problem' = 'done') {
    const id = next++
    notices.value = [...notices.value, { id, text, kind }]
    if (kind === 'done' && import.meta.client) setTimeout(drop, 6000, id)
  }
  return { notices, say, drop }
})
