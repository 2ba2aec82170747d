import { namedListQuery } from '#shared/schemas/crews-and-sites'
import { dutiesView } from '#shared/schemas/requirements'
import { readDuties } from '../../services/duties'

export default defineRoute({
  summary: 'The duties, in the order of the wall',
  ability: 'requirements.read',
  query: namedListQuery,
  answer: dutiesView,
}, ({ work, query }) => readDuties(work, query))
