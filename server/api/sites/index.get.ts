import { namedListQuery, sitesView } from '#shared/schemas/crews-and-sites'
import { readSites } from '../../services/sites'

export default defineRoute({
  summary: 'The sites that concern the asker',
  ability: 'sites.read',
  query: namedListQuery,
  answer: sitesView,
}, ({ work, query }) => readSites(work, query))
