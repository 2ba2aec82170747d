import type { CrewingView, UsualView } from '#shared/schemas/crewing'

/**
 * A work day's plan at a site: slots by duty, placements by hand, and what the server says of them. Every change asks
 * again; the last answer counts.
 */
export function usePlan(siteId: Ref<string>, date: Ref<string>) {
  const { toProblem } = useApiError()
  const usual = ref<UsualView | null>(null)
  const slots = ref<Record<string, number>>({})
  const locked = ref<{ duty: string, personId: string }[]>([])
  const needsFirstAid = ref(true)
  const answer = ref<CrewingView | null>(null)
  const problem = ref('')
  const isAsking = ref(false)
  let asked = 0

  async function ask() {
    const wanted = Object.entries(slots.value).filter(([, count]) => count > 0).map(([duty, count]) => ({ duty, count }))
    if (!siteId.value || !date.value || wanted.length === 0) return void (answer.value = null)
    const number = ++asked
    isAsking.value = true
    try {
      const body = { siteId: siteId.value, date: date.value, slots: wanted, ...(locked.value.length > 0 && { locked: locked.value }), ...(needsFirstAid.value && { presence: [{ type: 'first-aid-cpr' }] }) }
      const got = await $fetch<CrewingView>('/api/crewing', { method: 'POST', body })
      if (number !== asked) return
      answer.value = got
      problem.value = ''
    }
    catch (error) {
      if (number === asked) problem.value = toProblem(error).text
    }
    finally {
      if (number === asked) isAsking.value = false
    }
  }
  async function load() {
    if (!siteId.value || !date.value) return
    try {
      usual.value = await useRequestFetch()<UsualView>('/api/crewing', { query: { site: siteId.value, date: date.value } })
      slots.value = Object.fromEntries(usual.value.slots.map(slot => [slot.duty, slot.count]))
      locked.value = []
    }
    catch (error) {
      problem.value = toProblem(error).text
    }
    if (import.meta.client) await ask()
  }
  /** Puts a person on a duty by hand, or takes the hand off. */
  function toggleLock(duty: string, personId: string) {
    const isLocked = locked.value.some(place => place.personId === personId)
    locked.value = isLocked ? locked.value.filter(place => place.personId !== personId) : [...locked.value, { duty, personId }]
    void ask()
  }
  return { usual, slots, locked, needsFirstAid, answer, problem, isAsking, ask, load, toggleLock }
}
