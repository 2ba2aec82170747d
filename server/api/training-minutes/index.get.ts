import { trainingMinutesQuery, trainingMinutesView } from '#shared/schemas/training'
import { readTrainingMinutes } from '../../services/training-minutes'

export default defineRoute({
  summary: 'Counted minutes of required training between two dates, by person',
  ability: 'trainingMinutes.read',
  query: trainingMinutesQuery,
  answer: trainingMinutesView,
}, ({ work, query }) => readTrainingMinutes(work, query))
