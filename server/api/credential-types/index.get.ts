import { namedListQuery } from '#shared/schemas/crews-and-sites'
import { typesView } from '#shared/schemas/requirements'
import { readTypes } from '../../services/credential-types'

export default defineRoute({
  summary: 'The credential types with their basis and source',
  ability: 'requirements.read',
  query: namedListQuery,
  answer: typesView,
}, ({ work, query }) => readTypes(work, query))
