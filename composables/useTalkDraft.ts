import type { CompanyTalkBody } from '#shared/schemas/company-texts'

/** An empty talk of the company's own. */
export const emptyTalk = (): CompanyTalkBody => ({
  title: { en: '', es: '' }, minutes: 7, work: [], hazards: [], seasons: [], text: { en: '', es: '' }, sources: [],
  check: { question: { en: '', es: '' }, options: (['a', 'b', 'c'] as const).map(id => ({ id, text: { en: '', es: '' } })), right: 'a', explain: { en: '', es: '' } },
})

/** A talk that is being written; what is typed survives a reload of this tab until it is saved. */
export function useTalkDraft(key: string, start: CompanyTalkBody) {
  const draft = ref<CompanyTalkBody>(structuredClone(start))
  onMounted(() => {
    try {
      const kept = sessionStorage.getItem(key)
      if (kept) draft.value = JSON.parse(kept) as CompanyTalkBody
    }
    catch {
      sessionStorage.removeItem(key)
    }
    watch(draft, now => sessionStorage.setItem(key, JSON.stringify(now)), { deep: true })
  })
  const forget = () => sessionStorage.removeItem(key)
  return { draft, forget }
}
