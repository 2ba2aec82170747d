import { languageQuery, moduleParams, startedAttempt } from '#shared/schemas/learning'
import { startAttempt } from '../../../services/quiz'

export default defineRoute({
  summary: 'Start the quiz, or go on with the attempt that is running',
  ability: 'learning.own',
  params: moduleParams,
  query: languageQuery,
  answer: startedAttempt,
  status: 201,
}, async ({ work, params, query, event }) => startAttempt(work, await getTeaching(event), { ...params, language: query.language ?? work.actor.language }))
