import type { ClearanceView } from '#shared/schemas/clearance'
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
  /** Who is cleared for which duty that day: whom a hand may place. */
  const cleared = ref<Record<string, string[]>>({})
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
      const { people } = await useRequestFetch()<ClearanceView>('/api/clearance', { query: { site: siteId.value, date: date.value } })
      const found: Record<string, string[]> = {}
      for (const { personId, duties } of people) for (const { duty, state } of duties) if (state === 'cleared') (found[duty] ??= []).push(personId)
      cleared.value = found
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
  /** Puts somebody on a duty by hand, from wherever they were. */
  function place(duty: string, personId: string) {
    locked.value = [...locked.value.filter(one => one.personId !== personId), { duty, personId }]
    void ask()
  }
  return { usual, slots, locked, cleared, place, needsFirstAid, answer, problem, isAsking, ask, load, toggleLock }
}
