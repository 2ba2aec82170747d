import type { PersonView } from '#shared/schemas/people'

const texts = ['name', 'badge', 'email', 'phone', 'employer', 'trade', 'hiredOn', 'leftOn', 'crewId', 'under18Until'] as const
type TextField = typeof texts[number]

/** A person's form: fields as typed, and only what was changed is sent. */
export function usePersonForm(person: PersonView | null) {
  const start = (field: TextField) => (person && field in person ? String((person as Record<string, unknown>)[field] ?? '') : '')
  const form = reactive({
    ...Object.fromEntries(texts.map(field => [field, start(field)])) as Record<TextField, string>,
    role: person?.role ?? 'worker', language: person?.language ?? 'en', employerKind: person?.employerKind ?? 'own', currentPassword: '',
  })
  const first = { ...form }
  const needed: readonly string[] = ['name', 'badge', 'employer', 'hiredOn', 'role', 'language', 'employerKind']

  /** The body to send: for a new person all that was typed, for a known one what changed; an emptied field becomes null. */
  function toBody(): Record<string, unknown> {
    const body: Record<string, unknown> = {}
    for (const [field, value] of Object.entries(form)) {
      if (person ? value === first[field as keyof typeof first] : value === '') continue
      body[field] = value.trim() === '' && !needed.includes(field) ? null : value.trim()
    }
    if (person) body.version = person.version
    return body
  }
  const needsPassword = computed(() => form.role !== first.role && (form.role === 'safety' || form.role === 'admin'))
  return { form, toBody, needsPassword }
}
