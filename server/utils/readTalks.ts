import type { H3Event } from 'h3'
import { queryCollection } from '@nuxt/content/server'
import { withCompanyTalks } from '../services/company-texts'
import { parseChecks, toTalk, type Talk, type Talks, type TalkText } from '../services/talks'

let reading: Promise<Talks> | undefined

const slugOf = (path: string) => path.split('/').at(-1)!

async function load(event: H3Event): Promise<Talks> {
  const [english, spanish, yaml] = await Promise.all([
    queryCollection(event, 'talksEn').all(), queryCollection(event, 'talksEs').all(), useStorage('assets:server').getItem<string>('talk-checks.yaml'),
  ])
  const checks = parseChecks(String(yaml))
  // The content database gives numbers back as text.
  const text = ({ title, minutes, work, hazards, seasons, sources, body }: TalkText): TalkText => ({ title, minutes: Number(minutes), work, hazards, seasons, sources, body })
  const talks = new Map<string, Talk>()
  for (const page of english) {
    const slug = slugOf(page.path)
    const other = spanish.find(row => slugOf(row.path) === slug)
    const check = checks.get(slug)
    if (!other || !check) throw new Error(`The talk ${slug} lacks ${other ? 'its check question' : 'its Spanish text'}`)
    talks.set(slug, toTalk(slug, { en: text(page), es: text(other) }, check))
  }
  return talks
}

/** Every talk: the shipped ones, read once per process because content changes only with a new build, and the company's own. */
export async function readTalks(event: H3Event): Promise<Talks> {
  return withCompanyTalks(event.context.db, await readShippedTalks(event))
}

function readShippedTalks(event: H3Event): Promise<Talks> {
  return reading ??= load(event).catch((error: unknown) => {
    reading = undefined
    throw error
  })
}
