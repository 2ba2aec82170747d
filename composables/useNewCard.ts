import type { CredentialView } from '#shared/schemas/credentials'
import type { TypeChoice } from './useChoices'

const details = ['trainer', 'evaluator', 'evaluatedOn', 'equipment'] as const

/** The form for an outside card: what was typed, the file that was sent, and what is wrong with either. */
export function useNewCard(personId: string, types: () => readonly TypeChoice[]) {
  const { toProblem } = useApiError()
  const { t } = useI18n()
  const form = reactive({ type: '', issuedOn: '', expiresOn: '', siteId: '', issuer: '', number: '', trainer: '', evaluator: '', evaluatedOn: '', equipment: '' })
  const isSaving = ref(false)
  const problem = ref('')
  const fields = ref<Record<string, string>>({})
  const chosen = computed(() => types().find(type => type.code === form.type))

  function tell(error: unknown) {
    const found = toProblem(error)
    problem.value = found.text
    fields.value = Object.fromEntries(Object.keys(found.fields).map(field => [field, found.text]))
  }
  const { fileId, isSending, send: upload } = useUpload(tell)
  function send(file: File) {
    problem.value = ''
    fields.value = {}
    return upload(file)
  }
  function findGaps(): Record<string, string> {
    const needed = ['type', 'issuedOn', ...(chosen.value?.validity.kind === 'printed' ? ['expiresOn'] : []), ...(chosen.value?.perSite ? ['siteId'] : [])]
    return Object.fromEntries(needed.filter(name => !form[name as keyof typeof form]).map(name => [name, t('field.required')]))
  }
  const toBody = () => ({
    personId, type: form.type, issuedOn: form.issuedOn,
    expiresOn: chosen.value?.validity.kind === 'printed' ? form.expiresOn : null,
    siteId: chosen.value?.perSite ? form.siteId : null,
    issuer: form.issuer || null, number: form.number || null, fileId: fileId.value || null,
    details: Object.fromEntries(details.filter(name => form[name]).map(name => [name, form[name]])),
  })
  /** Saves the card and answers it; undefined when something is wrong, which is then told in `problem` and `fields`. */
  async function save(): Promise<CredentialView | undefined> {
    problem.value = ''
    fields.value = findGaps()
    if (Object.keys(fields.value).length > 0) {
      await nextTick()
      problem.value = t('field.fixThese')
      return undefined
    }
    isSaving.value = true
    try {
      return await $fetch<CredentialView>('/api/credentials', { method: 'POST', body: toBody() })
    }
    catch (error) {
      tell(error)
      return undefined
    }
    finally {
      isSaving.value = false
    }
  }
  return { form, fileId, isSending, isSaving, problem, fields, chosen, send, save }
}
