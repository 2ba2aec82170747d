import { designationsQuery, designationsView } from '#shared/schemas/requirements'
import { readDesignations } from '../../services/designations'

export default defineRoute({
  summary: 'The written namings within reach',
  ability: 'requirements.read',
  query: designationsQuery,
  answer: designationsView,
}, ({ work, query }) => readDesignations(work, query))
