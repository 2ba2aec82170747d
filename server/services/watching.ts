import { getBriefing } from '../data/briefings'
import { loadReach, isWithin } from '../data/reach'
import { can } from '#shared/access/abilities'
import { todayOfCompany } from './today'
import { readSession } from './sessions'
import type { Work } from './work'

/** Whether the session that opened a live stream may still see it now: signed in, able, and the site within reach. */
export async function mayStillWatch(work: Work, cookieHeader: string, briefingId: string): Promise<boolean> {
  const { db, settings } = work
  const today = await todayOfCompany(db, settings.clock.now())
  const { actor } = await readSession(db, settings, cookieHeader, today)
  if (!actor || !can(actor, 'briefing.run')) return false
  const briefing = await getBriefing(db, briefingId)
  return briefing !== null && isWithin((await loadReach(db, actor, today)).siteIds, briefing.siteId)
}
