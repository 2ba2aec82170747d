/** Sends a chosen file at once, so that saving the form it belongs to is quick; what is wrong goes to `tell`. */
export function useUpload(tell: (error: unknown) => void) {
  const fileId = ref('')
  const isSending = ref(false)
  async function send(file: File) {
    fileId.value = ''
    isSending.value = true
    const body = new FormData()
    body.append('file', file)
    try {
      fileId.value = (await $fetch<{ id: string }>('/api/files', { method: 'POST', body })).id
    }
    catch (error) {
      tell(error)
    }
    isSending.value = false
  }
  /** For the `change` of a file input. */
  function pick(event: Event) {
    const file = (event.target as HTMLInputElement).files?.[0]
    if (file) void send(file)
  }
  return { fileId, isSending, pick, send }
}
