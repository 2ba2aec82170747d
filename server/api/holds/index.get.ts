import { holdsQuery, holdsView } from '#shared/schemas/requirements'
import { readHolds } from '../../services/holds'

export default defineRoute({
  summary: 'The holds within reach; reasons for the safety manager only',
  ability: 'requirements.read',
  query: holdsQuery,
  answer: holdsView,
}, ({ work, query }) => readHolds(work, query))
