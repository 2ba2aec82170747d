import type { WorkTag } from '#shared/domain/states'
import type { OpenBriefingBody } from '#shared/schemas/briefing'
import type { TodayView } from '#shared/schemas/today'
import type { WeatherTyped } from '~/components/today/TodayWeather.vue'

/** A lead's morning at the chosen site: what the server says, what the lead picked, and starting the briefing. */
export function useMorning() {
  const place = usePlaceStore()
  const { toProblem } = useApiError()
  const work = ref<WorkTag[] | null>(null)
  const weather = ref<WeatherTyped>({ temperatureF: '', windMph: '', humidity: '' })
  const talk = ref('')
  const notes = ref('')
  const isStarting = ref(false)
  const problem = ref('')
  /** Kept until the briefing exists, so that a second tap or a lost answer opens no second one. */
  const id = ref('')

  const typed = computed(() => Object.fromEntries(Object.entries(weather.value).filter(([, value]) => value !== '')) as Record<string, number>)
  const query = computed(() => ({ ...typed.value, ...(work.value && { work: work.value.join(',') }) }))
  const { data: today, error, refresh } = useFetch<TodayView>(() => `/api/sites/${place.site?.id ?? 'none'}/today`, { query, immediate: !!place.site })
  watch(() => place.site?.id, () => work.value = null)
  watch(today, (now) => {
    if (now && !now.suggestions.some(row => row.slug === talk.value)) talk.value = now.suggestions[0]?.slug ?? ''
  }, { immediate: true })

  function toggle(tag: WorkTag) {
    const current = work.value ?? today.value?.work ?? []
    work.value = current.includes(tag) ? current.filter(one => one !== tag) : [...current, tag]
  }
  async function start() {
    if (!today.value || !talk.value) return
    isStarting.value = true
    problem.value = ''
    id.value ||= newKey()
    const body: OpenBriefingBody = { id: id.value, siteId: today.value.site.id, talk: talk.value, work: work.value ?? today.value.work, ...(notes.value.trim() && { notes: notes.value }), ...(Object.keys(typed.value).length > 0 && { weather: typed.value }) }
    try {
      await $fetch('/api/briefings', { method: 'POST', body })
      await navigateTo(`/briefings/${id.value}`)
    }
    catch (caught) {
      problem.value = toProblem(caught).text
    }
    isStarting.value = false
  }
  return { place, today, error, refresh, work, weather, talk, notes, toggle, start, isStarting, problem }
}
