import type { PresenceView } from '#shared/schemas/briefing'
import { assertNotSealed, requireOwnBriefing } from './briefing-access'
import { presenceNow } from './presence'
import type { Work } from './work'

/** The link that a presence code travels in: the site's page, the briefing, the code. */
export const presenceUrl = (origin: string, siteCode: string, briefingId: string, code: string) => `${origin}/s/${encodeURIComponent(siteCode)}?b=${briefingId}&c=${code}`

/** The code of this half minute and its link, for who runs the briefing; also after closing, for the latecomers. 409 when sealed. */
export async function showPresence(work: Work, briefingId: string, origin: string): Promise<PresenceView> {
  const briefing = await requireOwnBriefing(work, briefingId)
  assertNotSealed(briefing, work.now)
  const { code, validUntil, takenUntil } = presenceNow(briefing.secret, work.now)
  return { code, url: presenceUrl(origin, briefing.site.code, briefing.id, code), validUntil, takenUntil, secondsLeft: (Date.parse(validUntil) - Date.parse(work.now)) / 1000 }
}
