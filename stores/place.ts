import type { PlacesView } from '#shared/schemas/places'

/** The site and date that the field screens are about; the choice outlives the page in a cookie. */
export const usePlaceStore = defineStore('place', () => {
  const sites = ref<PlacesView['sites']>([])
  const chosen = useCookie<string | null>('site', { sameSite: 'lax', maxAge: 60 * 60 * 24 * 90, default: () => null })
  const site = computed(() => sites.value.find(row => row.id === chosen.value) ?? sites.value[0] ?? null)

  async function load() {
    const ask = useRequestFetch()
    sites.value = await ask<PlacesView>('/api/session/sites').then(answer => answer.sites, () => [])
  }
  function choose(id: string) {
    chosen.value = id
  }
  function $reset() {
    sites.value = []
    chosen.value = null
  }
  return { sites, site, load, choose, $reset }
})
