import type { ImportAnswer } from '#shared/schemas/imports'

/** An import in two steps: check a file without saving, then save it as it was checked. */
export function useImport() {
  const { toProblem } = useApiError()
  const what = ref<'people' | 'credentials'>('people')
  const order = ref<'' | 'mdy' | 'dmy'>('')
  const skip = ref(false)
  const file = shallowRef<File>()
  const answer = ref<ImportAnswer | null>(null)
  const problem = ref('')
  const fields = ref<Record<string, string>>({})
  const isBusy = ref(false)
  const isSaved = ref(false)
  watch([what, order], () => reset())

  function reset() {
    answer.value = null
    problem.value = ''
    fields.value = {}
    isSaved.value = false
  }
  function pick(chosen?: File) {
    file.value = chosen
    reset()
  }
  async function send(dryRun: boolean) {
    if (!file.value) return
    problem.value = ''
    fields.value = {}
    isBusy.value = true
    const body = new FormData()
    body.append('file', file.value)
    try {
      answer.value = await $fetch<ImportAnswer>(`/api/imports/${what.value}`, { method: 'POST', body, query: { dryRun, skipRejected: skip.value, ...(order.value && { dateOrder: order.value }) } })
      isSaved.value = !dryRun
    }
    catch (error) {
      const found = toProblem(error)
      problem.value = found.text
      fields.value = found.fields
    }
    isBusy.value = false
  }
  return { what, order, skip, answer, problem, fields, isBusy, isSaved, pick, check: () => send(true), save: () => send(false) }
}
