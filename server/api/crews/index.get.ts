import { crewsView, namedListQuery } from '#shared/schemas/crews-and-sites'
import { readCrews } from '../../services/crews'

export default defineRoute({
  summary: 'The crews that concern the asker, with their usual slots',
  ability: 'sites.read',
  query: namedListQuery,
  answer: crewsView,
}, ({ work, query }) => readCrews(work, query))
