const kept = ['state', 'within', 'includeExpired', 'site', 'crew', 'type', 'person', 'effective', 'q', 'sort'] as const
type FilterName = (typeof kept)[number]
type Filters = Partial<Record<FilterName, string>>

/** The desk opens on what runs out within this many days. */
const usualDays = '60'

/** The filters as the list's route takes them, from an address; `all=true` is the page's own word for "no window". */
export function toCredentialFilters(query: Record<string, unknown>): Filters {
  const filters: Filters = {}
  for (const name of kept) {
    const value = query[name]
    if (typeof value === 'string' && value !== '') filters[name] = value
  }
  const isNarrowed = filters.within ?? filters.state ?? filters.effective ?? filters.person ?? query.all
  return isNarrowed ? filters : { ...filters, within: usualDays, includeExpired: 'true' }
}

/** The list's filters live in the address, so that a view can be sent to somebody. */
export function useCredentialFilters() {
  const route = useRoute()
  const filters = computed(() => toCredentialFilters(route.query))
  const page = computed(() => Math.max(1, Math.trunc(Number(route.query.page)) || 1))
  const search = computed(() => new URLSearchParams(filters.value).toString())

  /** Changes some filters and goes back to the first page. An empty text takes a filter away. */
  function change(changes: Partial<Record<FilterName | 'all', string>>) {
    const next: Record<string, string | undefined> = { ...filters.value, all: typeof route.query.all === 'string' ? route.query.all : undefined, ...changes }
    const query = Object.fromEntries(Object.entries(next).filter(([, value]) => value))
    return navigateTo({ path: route.path, query })
  }
  return { filters, page, search, change }
}

/** The same filters as a body's values, for a calendar feed that keeps them. */
export function toFeedFilters(filters: Filters): Record<string, string> {
  return Object.fromEntries(Object.entries(filters).filter(([, value]) => value))
}
