import { languageQuery, wallView } from '#shared/schemas/learning'
import { readWall } from '../../services/modules'

export default defineRoute({
  summary: 'The training wall of the person who asks',
  ability: 'learning.own',
  query: languageQuery,
  answer: wallView,
}, async ({ work, query, event }) => readWall(work, await getTeaching(event), query.language ?? work.actor.language))
