import { endCalendarFeeds } from '~~/server/services/calendar-feed'

export default defineRoute({
  summary: 'End all of one\'s own calendar addresses',
  ability: 'credentials.read',
  status: 204,
}, ({ work }) => endCalendarFeeds(work))
