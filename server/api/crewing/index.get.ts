import { usualQuery, usualView } from '#shared/schemas/crewing'
import { readUsualDay } from '../../services/crewing'

export default defineRoute({
  summary: 'A day\'s usual slots at a site and the people rostered there',
  ability: 'clearance.read', query: usualQuery, answer: usualView,
}, ({ work, query }) => readUsualDay(work, query))
