import { idParams } from '#shared/schemas/common'
import { attemptResultView, languageQuery, submissionBody } from '#shared/schemas/learning'
import { submitAttempt } from '../../../services/quiz'

export default defineRoute({
  summary: 'Send the answers and be graded, once',
  ability: 'learning.own',
  params: idParams,
  query: languageQuery,
  body: submissionBody,
  answer: attemptResultView,
}, async ({ work, params, query, body, event }) => submitAttempt(work, await getTeaching(event), { ...params, ...body, language: query.language ?? work.actor.language }))
