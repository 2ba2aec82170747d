import { addDays } from '#shared/domain/dates'
import type { Bilingual, CredentialState } from '#shared/domain/states'
import type { ClearanceView } from '#shared/schemas/clearance'
import type { CrewingView, UsualView } from '#shared/schemas/crewing'

type Person = ClearanceView['people'][number]
type DutyAnswer = Person['duties'][number]
/** One square of the board: its mark, the few words beside it, and every reason in full. */
export interface BoardCell extends DutyAnswer { personId: string, name: string, mark: CredentialState | 'learning' | null, note: string, lines: { why: string, fix: string }[], isPlaced: boolean }
export interface BoardRow { id: string, name: string, crewId: string | null, cells: BoardCell[] }
interface Named { code: string, name: Bilingual }

/** A clearance that ends within this many days is drawn half-filled, as cards are by default. */
const soonDays = 60

/** The board of one site and date: who may do what, until when, what is missing, and whom the usual places take. */
export async function useBoard(place: { siteId: Ref<string>, date: Ref<string> }, names: { duties: () => readonly Named[], types: () => readonly Named[] }) {
  const { t } = useI18n()
  const { formatShortDate } = useDates()
  const { toProblem } = useApiError()
  const nameMap = (list: readonly Named[]) => Object.fromEntries(list.map(one => [one.code, one.name]))
  const { dutyName, whyWords } = useWhyNot(() => ({ dutyNames: nameMap(names.duties()), typeNames: nameMap(names.types()) }))
  const query = computed(() => ({ site: place.siteId.value, date: place.date.value }))
  // Both are asked before the first wait, after which a composable has no app around it any more.
  const asked = [useFetch<ClearanceView>('/api/clearance', { query }), useFetch<UsualView>('/api/crewing', { query })] as const
  const [{ data: answer, error, status }, { data: usual }] = asked
  const crewing = ref<CrewingView | null>(null)
  const problem = computed(() => (error.value ? toProblem(error.value).text : ''))

  /** Places the day's usual slots; asking acts nowhere, but it is a POST and so the browser's alone. */
  async function placeUsual() {
    crewing.value = null
    const { siteId, date } = { siteId: place.siteId.value, date: place.date.value }
    if (!usual.value || usual.value.slots.length === 0) return
    const got = await $fetch<CrewingView>('/api/crewing', { method: 'POST', body: { siteId, date, slots: usual.value.slots } }).catch(() => null)
    if (siteId === place.siteId.value && date === place.date.value) crewing.value = got
  }
  onMounted(placeUsual)
  watch(usual, () => import.meta.client && placeUsual())

  const isPlaced = (personId: string, duty: string) => crewing.value?.assignment.some(one => one.personId === personId && one.duty === duty) ?? false
  function toCell(duty: DutyAnswer, person: Person): BoardCell {
    const shared = { ...duty, personId: person.personId, name: person.name, isPlaced: isPlaced(person.personId, duty.duty) }
    if (duty.state === 'cleared') {
      const isSoon = duty.until !== null && duty.until <= addDays(answer.value!.date, soonDays)
      return { ...shared, mark: isSoon ? 'dueSoon' : 'inDate', note: isSoon ? t('board.until', { date: formatShortDate(duty.until) }) : '', lines: [] }
    }
    const lines = duty.missing.map(missing => whyWords({ ...duty, missing: [missing] }))
    const [first] = duty.missing
    const mark = duty.state === 'learning' ? 'learning' : first && first.why.kind !== 'neverHeld' ? lines[0]!.mark : null
    const note = first?.why.kind === 'expired' ? formatShortDate(first.why.on) : first?.why.kind === 'onHold' || first?.why.kind === 'notVerified' ? t(`board.note.${first.why.kind}`) : ''
    return { ...shared, mark, note, lines: lines.map(({ why, fix }) => ({ why, fix })) }
  }
  const rows = computed<BoardRow[]>(() => (answer.value?.people ?? []).map(person => ({ id: person.personId, name: person.name, crewId: person.crewId, cells: person.duties.map(duty => toCell(duty, person)) })))
  const places = computed(() => {
    const wanted = usual.value?.slots.reduce((sum, slot) => sum + slot.count, 0) ?? 0
    return wanted > 0 && crewing.value ? { wanted, short: crewing.value.short.reduce((sum, slot) => sum + slot.count, 0) } : null
  })
  await Promise.all(asked)
  return { answer, rows, places, usual, problem, isAsking: computed(() => status.value === 'pending'), dutyName }
}
