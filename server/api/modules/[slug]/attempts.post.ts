import { attemptBody, languageQuery, moduleParams, startedAttempt } from '#shared/schemas/learning'
import { startAttempt } from '../../../services/quiz'

export default defineRoute({
  summary: 'Start the quiz, or go on with the attempt that is running; an assessor may read it to somebody',
  ability: 'learning.own',
  params: moduleParams,
  query: languageQuery,
  body: attemptBody,
  answer: startedAttempt,
  status: 201,
}, async ({ work, params, query, body, event }) => startAttempt(work, await getTeaching(event), { ...params, ...body, language: query.language ?? work.actor.language }))
