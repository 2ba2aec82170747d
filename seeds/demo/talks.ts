import { canonicalJson, sha256 } from '../../server/services/hashing'
import type { TalkVersions } from '../../server/data/briefings'
import type { WorkTag } from '../../shared/domain/states'
import type { Random } from './random'

interface DemoTalk { slug: string, title: { en: string, es: string }, work: readonly WorkTag[], isForCold?: boolean }

/** The talks that were given, by the titles of the content; a test keeps them equal. */
export const demoTalks: readonly DemoTalk[] = [
  { slug: 'braces-and-wind', title: { en: 'Braces and wind', es: 'Los puntales y el viento' }, work: ['brace', 'stack'] },
  { slug: 'capped-bars', title: { en: 'Capped bars', es: 'Varillas tapadas' }, work: ['steel'] },
  { slug: 'cold-hands-wet-cement', title: { en: 'Cold hands, wet cement', es: 'Manos frías, cemento fresco' }, work: ['pour'], isForCold: true },
  { slug: 'first-blocks', title: { en: 'First courses: level, overlap, hands and backs', es: 'Las primeras hiladas: nivel, traslape, manos y espalda' }, work: ['stack'] },
  { slug: 'hose-whip', title: { en: 'Hose whip and the first stroke', es: 'El latigazo de la manguera y el primer golpe' }, work: ['pour'] },
  { slug: 'ladders-and-walkways', title: { en: 'Ladders and walkways', es: 'Escaleras y andamios' }, work: ['stack', 'steel', 'pour'] },
]

/** A talk that fits the work and the month, another one than last time where there is a choice. */
export function pickTalk(work: readonly WorkTag[], month: number, last: string | undefined, random: Random): DemoTalk {
  const isCold = month >= 10 || month <= 4
  const fitting = demoTalks.filter(talk => talk.work.some(tag => work.includes(tag)) && (!talk.isForCold || isCold))
  const fresh = fitting.filter(talk => talk.slug !== last)
  return random.pick(fresh.length > 0 ? fresh : fitting)
}

/** The words that were given: an earlier state of the text, so its hash is not today's. */
export function versionsOf(talk: DemoTalk): TalkVersions {
  const hashOf = (language: 'en' | 'es') => sha256(canonicalJson({ title: talk.title[language], body: 'As it was before today' }))
  return { en: { title: talk.title.en, hash: hashOf('en'), sources: [] }, es: { title: talk.title.es, hash: hashOf('es'), sources: [] } }
}
