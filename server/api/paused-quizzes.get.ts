import { languageQuery } from '#shared/schemas/learning'
import { pausedQuizList } from '#shared/schemas/training'
import { listPausedQuizzes } from '../services/assessor-talks'

export default defineRoute({
  summary: 'Paused quizzes of people whom one may assess',
  ability: 'signOff.give',
  query: languageQuery,
  answer: pausedQuizList,
}, async ({ work, query, event }) => listPausedQuizzes(work, await getTeaching(event), query.language ?? work.actor.language))
