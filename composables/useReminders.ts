import type { Page } from '#shared/schemas/common'
import type { CredentialItem } from '#shared/schemas/credentials'

type Answer = { queued: number, withoutEmail: { name: string }[] }

/** Sends reminders about everything that the filters leave, after a question. */
export function useReminders(filters: () => Partial<Record<string, string>>) {
  const { t } = useI18n()
  const notices = useNoticesStore()
  const { toProblem } = useApiError()
  const isOpen = ref(false)
  const isBusy = ref(false)

  async function idsOfAll(): Promise<string[]> {
    const ids: string[] = []
    for (let page = 1; ; page++) {
      const { items, total } = await $fetch<Page<CredentialItem>>('/api/credentials', { query: { ...filters(), page, perPage: 200 } })
      ids.push(...items.filter(item => item.expiresOn !== null).map(item => item.id))
      if (items.length < 200 || page * 200 >= total) return ids
    }
  }
  async function send() {
    isBusy.value = true
    try {
      const { queued, withoutEmail } = await $fetch<Answer>('/api/reminders', { method: 'POST', body: { credentialIds: await idsOfAll() } })
      notices.say(t('credentials.remind.sent', queued))
      if (withoutEmail.length > 0) notices.say(t('credentials.remind.withoutEmail', { names: withoutEmail.map(person => person.name).join(', ') }), 'problem')
      isOpen.value = false
    }
    catch (error) {
      notices.say(toProblem(error).text, 'problem')
    }
    isBusy.value = false
  }
  return { isOpen, isBusy, send }
}
