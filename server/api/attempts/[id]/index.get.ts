import { idParams } from '#shared/schemas/common'
import { attemptView, languageQuery } from '#shared/schemas/learning'
import { readAttempt } from '../../../services/quiz'

export default defineRoute({
  summary: 'One\'s own attempt, to go on with or to look back at',
  ability: 'learning.own',
  params: idParams,
  query: languageQuery,
  answer: attemptView,
}, ({ work, params, query }) => readAttempt(work, params.id, query.language ?? work.actor.language))
