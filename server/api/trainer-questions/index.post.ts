import { languageQuery } from '#shared/schemas/learning'
import { questionBody, questionView } from '#shared/schemas/training'
import { askTrainer } from '../../services/trainer-questions'

export default defineRoute({
  summary: 'Ask a named trainer about a lesson or a question of the quiz',
  ability: 'learning.own',
  query: languageQuery,
  body: questionBody,
  answer: questionView,
  status: 201,
}, async ({ work, body, query, event }) => askTrainer(work, await getTeaching(event), { body, language: query.language ?? work.actor.language }))
