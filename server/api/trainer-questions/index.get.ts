import { languageQuery } from '#shared/schemas/learning'
import { questionList } from '#shared/schemas/training'
import { readQuestions } from '../../services/trainer-questions'

export default defineRoute({
  summary: 'One\'s own questions to trainers, and those one is asked',
  ability: 'learning.own',
  query: languageQuery,
  answer: questionList,
}, async ({ work, query, event }) => readQuestions(work, await getTeaching(event), query.language ?? work.actor.language))
