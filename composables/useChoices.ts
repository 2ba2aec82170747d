import type { Bilingual } from '#shared/domain/states'

interface Listed<Item> { items: Item[] }
export interface TypeChoice { code: string, name: Bilingual, module?: string | null, perSite?: boolean, validity: { kind: 'never' | 'period' | 'printed' } }

/** The credential types, sites and crews that a form or filter offers; empty while they can't be read. */
export async function useChoices() {
  const query = { perPage: 200 }
  const [types, sites, crews] = await Promise.all([
    useFetch<Listed<TypeChoice>>('/api/credential-types', { query, key: 'choices-types', default: () => ({ items: [] }) }),
    useFetch<Listed<{ id: string, name: string }>>('/api/sites', { query, key: 'choices-sites', default: () => ({ items: [] }) }),
    useFetch<Listed<{ id: string, name: string }>>('/api/crews', { query, key: 'choices-crews', default: () => ({ items: [] }) }),
  ])
  return reactive({
    types: computed(() => types.data.value?.items ?? []),
    sites: computed(() => sites.data.value?.items ?? []),
    crews: computed(() => crews.data.value?.items ?? []),
  })
}
