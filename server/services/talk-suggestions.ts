import { addDays, dateInZone } from '#shared/domain/dates'
import { hazardsOfNearMiss } from '#shared/domain/near-misses'
import { suggestTalks } from '#shared/domain/suggestions'
import type { WorkTag } from '#shared/domain/states'
import type { SuggestionView } from '#shared/schemas/talk'
import { lastDaysOfTalks } from '../data/briefings'
import { listNearMissesSince } from '../data/near-misses'
import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { notFound } from './refusal'
import { type Talks, toListItem } from './talks'
import { talkHazardsOf, type WeatherInput } from './weather-hazards'
import type { Work } from './work'

interface Asked extends WeatherInput { site: string, date?: string, work?: WorkTag[] }

/** Scores every talk for a site's morning. The weather counts only when it was entered; near misses of the last 30 days count, here and elsewhere. */
export async function suggestForSite(work: Work, asked: Asked, talks: Talks): Promise<SuggestionView[]> {
  const site = await getSite(work.db, asked.site)
  if (!site || !isWithin((await work.reach()).siteIds, site.id)) throw notFound('site')
  const date = asked.date ?? dateInZone(work.now, site.timeZone)
  const nearMisses = (await listNearMissesSince(work.db, addDays(date, -30))).filter(one => one.happenedOn <= date)
    .map(one => ({ hazards: hazardsOfNearMiss(one.kind), date: one.happenedOn, isHere: one.siteId === site.id }))
  const history = await lastDaysOfTalks(work.db, site.id, date)
  return suggestTalks({ talks: [...talks.values()], day: { date, work: asked.work ?? [], hazards: talkHazardsOf(asked) }, history, nearMisses })
    .map(({ slug, score, reasons }) => ({ ...toListItem(talks.get(slug)!, work.actor.language), score, reasons }))
}
