import type { AdmissionView, SignInAnswer, Visitor } from '#shared/schemas/briefing'
import type { Mark } from '#shared/schemas/mark'
import type { TalkView } from '#shared/schemas/talk'

interface Kept { briefing: string, key: string, admission: AdmissionView }
export type WhoSigns = { kind: 'session' } | { kind: 'badge', badge: string, pin: string, stay: boolean } | { kind: 'visitor', visitor: Visitor }

const shelf = 'pourwright-admission'

/** A phone at the poster: a code becomes an admission at once, which survives a reload; then one sign-in. */
export function usePosterSignIn(briefingId: () => string | undefined) {
  const { locale } = useI18n()
  const { toProblem } = useApiError()
  const session = useSessionStore()
  const kept = ref<Kept | null>(null)
  const answer = ref<SignInAnswer | null>(null)
  const talk = ref<TalkView | null>(null)
  const problem = ref('')
  const isBusy = ref(false)
  const isOver = ref(false)

  function keep(value: Kept | null) {
    kept.value = value
    if (value) sessionStorage.setItem(shelf, JSON.stringify(value))
    else sessionStorage.removeItem(shelf)
  }
  /** Takes up an admission that was there before a reload, unless another briefing was asked for or it has run out. */
  function resume() {
    try {
      const before = JSON.parse(sessionStorage.getItem(shelf) ?? 'null') as Kept | null
      if (before && (!briefingId() || before.briefing === briefingId())) kept.value = before
    }
    catch {
      sessionStorage.removeItem(shelf)
    }
  }
  async function guarded(run: () => Promise<void>) {
    isBusy.value = true
    problem.value = ''
    try {
      await run()
    }
    catch (error) {
      const { text, code } = toProblem(error)
      problem.value = text
      if (code === 'sealed' || code === 'dayOver') isOver.value = true
      if (code === 'badAdmission' || code === 'admissionUsed' || isOver.value) keep(null)
    }
    isBusy.value = false
  }
  const redeem = (code: string) => guarded(async () => {
    const briefing = briefingId()
    if (!briefing) return
    const admission = await $fetch<AdmissionView>(`/api/briefings/${briefing}/admissions`, { method: 'POST', body: { code } })
    keep({ briefing, key: newKey(), admission })
  })
  const sign = (who: WhoSigns, mark: Mark) => guarded(async () => {
    if (!kept.value) return
    const { briefing, key, admission } = kept.value
    if (who.kind === 'badge' && who.stay) {
      await $fetch('/api/session', { method: 'POST', body: { badge: who.badge, pin: who.pin } })
      await session.load()
    }
    const own = who.kind === 'visitor' ? { visitor: who.visitor } : who.kind === 'badge' ? { badge: who.badge, pin: who.pin } : {}
    answer.value = await $fetch<SignInAnswer>(`/api/briefings/${briefing}/sign-ins`, { method: 'POST', body: { key, method: 'ownPhone', admission: admission.admission, mark, language: locale.value, ...own } })
    keep(null)
  })
  async function readTalk() {
    talk.value = kept.value ? await $fetch<TalkView>(`/api/briefings/${kept.value.briefing}/admission`).catch(() => null) : null
  }
  return { kept, answer, talk, problem, isBusy, isOver, resume, redeem, sign, readTalk }
}
