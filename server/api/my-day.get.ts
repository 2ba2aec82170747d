import { myDayView } from '#shared/schemas/my-day'
import { viewMyDay } from '../services/my-day'

export default defineRoute({
  summary: 'My own day: where I am rostered, today\'s briefings, talks I missed',
  ability: 'own.records', answer: myDayView,
}, ({ work }) => viewMyDay(work))
