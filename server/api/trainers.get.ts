import { trainerList, trainersQuery } from '#shared/schemas/training'
import { readTrainers } from '../services/trainer-questions'

export default defineRoute({
  summary: 'Whom a learner may ask about a module',
  ability: 'learning.own',
  query: trainersQuery,
  answer: trainerList,
}, async ({ work, query, event }) => readTrainers(work, await getTeaching(event), query.module))
