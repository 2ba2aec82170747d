import { queryCollection } from '@nuxt/content/server'
import type { H3Event } from 'h3'
import { toTeaching, type Teaching } from '../services/teaching'
import { readBanks } from './readBanks'

let loaded: Promise<Teaching> | undefined

/** The content database gives numbers back as text. */
const toNumbers = <Page extends { minutes: number, order: number }>(page: Page): Page => ({ ...page, minutes: Number(page.minutes), order: Number(page.order) })

async function load(event: H3Event): Promise<Teaching> {
  const [modulesEn, modulesEs, lessonsEn, lessonsEs, banks] = await Promise.all([
    queryCollection(event, 'modulesEn').select('path', 'summary', 'cautions', 'checklist', 'sources').all(),
    queryCollection(event, 'modulesEs').select('path', 'summary', 'cautions', 'checklist', 'sources').all(),
    queryCollection(event, 'lessonsEn').select('path', 'title', 'minutes', 'order').all(),
    queryCollection(event, 'lessonsEs').select('path', 'title', 'minutes', 'order').all(),
    readBanks(),
  ])
  return toTeaching({ modules: { en: modulesEn, es: modulesEs }, lessons: { en: lessonsEn.map(toNumbers), es: lessonsEs.map(toNumbers) }, banks })
}

/** Every written module with its bank: read once, and again at each request while developing. Throws when a bank is not sound. */
export function getTeaching(event: H3Event): Promise<Teaching> {
  if (import.meta.dev) return load(event)
  loaded ??= load(event).catch((error: unknown) => {
    loaded = undefined
    throw error
  })
  return loaded
}
