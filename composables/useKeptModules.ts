import { cacheNames } from '#shared/offline/kept'
import type { ModuleView } from '#shared/schemas/learning'

interface Kept { title: string, bytes: number, keptAt: string }

const storeKey = 'kept-modules'
const readKept = () => JSON.parse(localStorage.getItem(storeKey) ?? '{}') as Record<string, Kept>

/** About the bytes that came over the air: text travels packed, and a worker in between hides the exact count. */
async function sizeOf(response: Response): Promise<number> {
  const body = await response.clone().blob()
  if (!/text|json|javascript/.test(body.type)) return body.size
  return (await new Response(body.stream().pipeThrough(new CompressionStream('gzip'))).blob()).size
}

/**
 * Modules kept on this phone: lessons with their drawings, in both languages, without the quiz. They open without
 * signal; reading is recorded when the signal is back. Needs https (or this very machine) for the service worker.
 */
export function useKeptModules() {
  const kept = ref<Record<string, Kept>>({})
  const isAvailable = ref(false)
  const progress = ref<{ done: number, total: number } | null>(null)
  const hasFailed = ref(false)

  onMounted(() => {
    isAvailable.value = 'caches' in window && 'serviceWorker' in navigator
    if (isAvailable.value) kept.value = readKept()
  })
  function write(next: Record<string, Kept>) {
    kept.value = next
    localStorage.setItem(storeKey, JSON.stringify(next))
  }
  const addressesOf = ({ slug, lessons }: Pick<ModuleView, 'slug' | 'lessons'>) => [
    '/learn', `/learn/${slug}`, ...lessons.map(lesson => `/learn/${slug}/${lesson.slug}`),
    ...['en', 'es'].flatMap(language => ['/api/modules', `/api/modules/${slug}`, ...lessons.map(lesson => `/api/modules/${slug}/lessons/${lesson.slug}`)].map(path => `${path}?language=${language}`)),
  ]

  async function fetchInto(name: string, url: string): Promise<{ bytes: number, text: string }> {
    const response = await fetch(url, { headers: { accept: url.startsWith('/api/') ? 'application/json' : 'text/html' } })
    if (!response.ok) throw new Error(`${url}: ${response.status}`)
    const isText = !url.startsWith('/_nuxt/') && !url.startsWith('/api/')
    const text = isText ? await response.clone().text() : ''
    const bytes = await sizeOf(response)
    await (await caches.open(name)).put(url, response)
    return { bytes, text }
  }

  /** Fetches everything; counts as it goes. What is there already is fetched anew, so that it fits together. */
  async function keep(module: Pick<ModuleView, 'slug' | 'title' | 'lessons'>) {
    hasFailed.value = false
    const addresses = addressesOf(module)
    progress.value = { done: 0, total: addresses.length }
    try {
      let bytes = 0
      const assets = new Set<string>()
      for (const url of addresses) {
        const got = await fetchInto(cacheNames.kept, url)
        bytes += got.bytes
        for (const [asset] of got.text.matchAll(/\/_nuxt\/[\w./-]+\.(?:js|css|woff2)/g)) assets.add(asset)
        progress.value = { done: progress.value.done + 1, total: addresses.length }
      }
      const cached = await caches.open(cacheNames.assets)
      for (const asset of assets) {
        if (!await cached.match(asset, { ignoreVary: true })) bytes += (await fetchInto(cacheNames.assets, asset)).bytes
      }
      write({ ...kept.value, [module.slug]: { title: module.title, bytes, keptAt: new Date().toISOString() } })
    }
    catch {
      hasFailed.value = true
    }
    finally {
      progress.value = null
    }
  }
  /** Takes a module off this phone. */
  async function remove(slug: string) {
    const cache = await caches.open(cacheNames.kept)
    for (const request of await cache.keys()) {
      const { pathname } = new URL(request.url)
      if (pathname.startsWith(`/learn/${slug}`) || pathname.startsWith(`/api/modules/${slug}`)) await cache.delete(request)
    }
    write(Object.fromEntries(Object.entries(kept.value).filter(([one]) => one !== slug)))
  }
  return { kept, isAvailable, progress, hasFailed, keep, remove }
}
