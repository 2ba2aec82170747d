import { can } from '#shared/access/abilities'
import { endOfDay } from '#shared/domain/dates'
import { type BriefingWithSite, getBriefing } from '../data/briefings'
import { isWithin } from '../data/reach'
import { notFound, Refusal } from './refusal'
import type { Db } from '../data/database'
import type { Work } from './work'

/** Whether the actor runs briefings at this site (may change them), oversees it (reads all), or neither. */
export async function accessTo(work: Work, siteId: string): Promise<'run' | 'read' | 'none'> {
  const { siteIds } = await work.reach()
  if (!isWithin(siteIds, siteId)) return 'none'
  return can(work.actor, 'briefing.run') ? 'run' : 'read'
}

/** The briefing; 404 when there is none. For public routes, whose proof is the admission. */
export async function requireBriefing(db: Db, id: string): Promise<BriefingWithSite> {
  const briefing = await getBriefing(db, id)
  if (!briefing) throw notFound('briefing')
  return briefing
}

/** The briefing, when the actor may run it; otherwise 404 (or 403 when they only oversee the site). */
export async function requireOwnBriefing(work: Work, id: string): Promise<BriefingWithSite> {
  const briefing = await requireBriefing(work.db, id)
  const access = await accessTo(work, briefing.siteId)
  if (access === 'none') throw notFound('briefing')
  if (access === 'read') throw new Refusal('forbidden', 'forbidden', { message: 'Your role does not run briefings' })
  return briefing
}

/** The briefing, when the actor may read all of it; otherwise 404. */
export async function requireReadableBriefing(work: Work, id: string): Promise<BriefingWithSite> {
  const briefing = await requireBriefing(work.db, id)
  if (await accessTo(work, briefing.siteId) === 'none') throw notFound('briefing')
  return briefing
}

/** 409 when nothing may be written any more: sealed, or the site's day is over. */
export function assertNotSealed(briefing: BriefingWithSite, now: string): void {
  if (briefing.sealedAt) throw new Refusal('conflict', 'sealed', { message: 'This briefing is sealed. Nothing can be changed now.' })
  if (now >= endOfBriefingDay(briefing)) throw new Refusal('conflict', 'dayOver', { message: 'The day of this briefing is over' })
}

/** The first instant after the briefing's day at its site. */
export const endOfBriefingDay = (briefing: BriefingWithSite) => endOfDay(briefing.localDate, briefing.site.timeZone)
