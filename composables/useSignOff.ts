import type { SignOffMade, SignOffRequestView } from '#shared/schemas/learning'

/** The steps of a hands-on as they are answered, the assessor's mark, and signing it. */
export function useSignOff(request: () => SignOffRequestView | null | undefined) {
  const { t } = useI18n()
  const { toProblem } = useApiError()
  const steps = ref<Record<string, { ok?: boolean, note: string }>>({})
  const mark = ref<{ kind: '' | 'tap' | 'typed', text: string }>({ kind: '', text: '' })
  const problem = ref('')
  const fields = ref<Record<string, string>>({})
  const busy = ref(false)
  const made = ref<SignOffMade | null>(null)

  watchEffect(() => {
    for (const { id } of request()?.checklist ?? []) steps.value[id] ??= { note: '' }
  })
  const passes = computed(() => (request()?.checklist ?? []).every(({ id }) => steps.value[id]?.ok !== false))

  function check(): boolean {
    const missing: Record<string, string> = {}
    request()?.checklist.forEach(({ id }, index) => {
      if (steps.value[id]?.ok === undefined) missing[id] = t('signOff.stepMissing', { n: index + 1 })
    })
    const hasMark = mark.value.kind === 'tap' || (mark.value.kind === 'typed' && mark.value.text.trim() !== '')
    if (!hasMark) missing.mark = t('signOff.markMissing')
    fields.value = missing
    return Object.keys(missing).length === 0
  }

  async function sign() {
    const asked = request()
    problem.value = ''
    if (!asked) return
    if (!check()) {
      await nextTick()
      problem.value = t('signOff.missing')
      return
    }
    busy.value = true
    try {
      made.value = await $fetch<SignOffMade>('/api/sign-offs', {
        method: 'POST',
        body: {
          personId: asked.personId, module: asked.module,
          steps: asked.checklist.map(({ id }) => {
            const { ok, note } = steps.value[id] ?? { note: '' }
            return { id, ok: ok === true, ...(!ok && note.trim() && { note: note.trim() }) }
          }),
          mark: mark.value.kind === 'typed' ? { kind: 'typed', text: mark.value.text.trim() } : { kind: 'tap' },
        },
      })
    }
    catch (error) {
      problem.value = toProblem(error).text
    }
    finally {
      busy.value = false
    }
  }
  return { steps, mark, problem, fields, busy, made, passes, sign }
}
