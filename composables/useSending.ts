type Problem = ReturnType<ReturnType<typeof useApiError>['toProblem']>

/**
 * One form's sending: `send(work)` runs it once at a time and keeps what was typed; what failed is in `problem`, and
 * `errorOf(field)` is the words for one field. `needs` names fields left empty, before anything is sent.
 */
export function useSending() {
  const { t } = useI18n()
  const { toProblem } = useApiError()
  const isBusy = ref(false)
  const problem = ref<Problem | null>(null)
  const missing = ref<string[]>([])

  const text = computed(() => (missing.value.length > 0 ? t('field.fixThese') : problem.value?.text ?? ''))
  function errorOf(field: string): string | undefined {
    if (missing.value.includes(field)) return t('field.required')
    return problem.value?.fields[field] === undefined ? undefined : problem.value.text
  }

  /** Runs `work` unless a field of `needs` is empty; true when it went well. */
  async function send(work: () => Promise<unknown>, needs: Record<string, unknown> = {}): Promise<boolean> {
    if (isBusy.value) return false
    problem.value = null
    missing.value = []
    await nextTick()
    missing.value = Object.keys(needs).filter(name => !String(needs[name] ?? '').trim())
    if (missing.value.length > 0) return false
    isBusy.value = true
    try {
      await work()
      return true
    }
    catch (error) {
      problem.value = toProblem(error)
      return false
    }
    finally {
      isBusy.value = false
    }
  }
  return { isBusy, problem, text, errorOf, send }
}
