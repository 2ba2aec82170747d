import { z } from 'zod'
import { readCalendarFeed } from '~~/server/services/calendar-feed'

export default definePublicRoute({
  summary: 'Renewals as an iCalendar feed, until its owner ends the link',
  params: z.strictObject({ token: z.string().min(1).max(100) }),
}, async ({ work, params, event }) => {
  const body = await readCalendarFeed(work, params.token)
  return sendDownload(event, { body, type: 'text/calendar; charset=utf-8', fileName: 'credentials.ics' }, 'inline')
})
