import type { ImportAnswer, ImportProgress } from '#shared/schemas/imports'

interface Columns { mapping: ImportAnswer['mapping'], example: string[] }

/** An import in two steps: check a file without saving, then save it as it was checked. */
export function useImport() {
  const { toProblem } = useApiError()
  const what = ref<'people' | 'credentials'>('people')
  const order = ref<'' | 'mdy' | 'dmy'>('')
  const skip = ref(false)
  const file = shallowRef<File>()
  const answer = ref<ImportAnswer | null>(null)
  /** The columns of a file that could not be understood by its header alone. */
  const asked = ref<Columns | null>(null)
  /** What was said of columns, by their header; '' is "not used". */
  const chosen = ref<Record<string, string>>({})
  const progress = ref<ImportProgress | null>(null)
  const problem = ref('')
  const isBusy = ref(false)
  const isSaved = ref(false)
  watch(order, () => reset())
  watch(what, () => pick(file.value))

  function reset() {
    answer.value = null
    asked.value = null
    problem.value = ''
    isSaved.value = false
  }
  function pick(next?: File) {
    file.value = next
    chosen.value = {}
    reset()
  }
  async function follow(key: string) {
    while (isBusy.value) {
      await new Promise(done => setTimeout(done, 400))
      if (isBusy.value) progress.value = await $fetch<ImportProgress>('/api/imports/progress', { query: { key } }).catch(() => progress.value)
    }
  }
  async function send(dryRun: boolean) {
    if (!file.value || isBusy.value) return
    problem.value = ''
    asked.value = null
    isBusy.value = true
    progress.value = { phase: 'reading', done: 0, total: 0 }
    const body = new FormData()
    body.append('file', file.value)
    const key = crypto.randomUUID()
    void follow(key)
    try {
      const columns = Object.keys(chosen.value).length > 0 ? JSON.stringify(chosen.value) : undefined
      answer.value = await $fetch<ImportAnswer>(`/api/imports/${what.value}`, { method: 'POST', body, query: { dryRun, skipRejected: skip.value, key, columns, ...(order.value && { dateOrder: order.value }) } })
      isSaved.value = !dryRun
    }
    catch (error) {
      const found = toProblem(error)
      problem.value = found.text
      if (Array.isArray(found.data.mapping)) asked.value = found.data as unknown as Columns
      if (dryRun) answer.value = null
    }
    isBusy.value = false
    progress.value = null
  }
  /** Says what a column is, and looks at the file again. */
  function choose(header: string, field: string) {
    chosen.value = { ...chosen.value, [header]: field }
    return send(true)
  }
  return { what, order, skip, file, answer, asked, progress, problem, isBusy, isSaved, pick, choose, check: () => send(true), save: () => send(false) }
}
