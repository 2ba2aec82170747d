import { personalCaches } from '#shared/offline/kept'

/** Deletes what this browser keeps of a person: pages, answers, kept modules. What waits to be sent stays: it is bound to its person. */
export async function forgetKept(): Promise<void> {
  if (!import.meta.client || !('caches' in window)) return
  localStorage.removeItem('kept-modules')
  await Promise.all(personalCaches.map(name => caches.delete(name)))
}
