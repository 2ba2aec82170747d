import { z } from 'zod'
import { calendarBody } from '#shared/schemas/credentials'
import { makeCalendarFeed } from '~~/server/services/calendar-feed'

export default defineRoute({
  summary: 'Make a calendar address of one\'s own, with the list\'s filters; it is shown once',
  ability: 'credentials.read',
  body: calendarBody,
  answer: z.object({ url: z.string() }),
  status: 201,
}, ({ work, body, event }) => makeCalendarFeed(work, body.filters ?? {}, originOf(event)))
