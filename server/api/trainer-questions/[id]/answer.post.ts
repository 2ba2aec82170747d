import { idParams } from '#shared/schemas/common'
import { languageQuery } from '#shared/schemas/learning'
import { answerBody, questionView } from '#shared/schemas/training'
import { answerLearner } from '../../../services/trainer-questions'

export default defineRoute({
  summary: 'Answer a learner\'s question',
  ability: 'learning.own',
  params: idParams,
  query: languageQuery,
  body: answerBody,
  answer: questionView,
}, async ({ work, params, body, query, event }) => answerLearner(work, await getTeaching(event), { ...params, ...body, language: query.language ?? work.actor.language }))
