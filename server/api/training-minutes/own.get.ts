import { addDays, dayOfWeek } from '#shared/domain/dates'
import { ownMinutesView } from '#shared/schemas/training'
import { readOwnMinutes } from '../../services/training-minutes'

export default defineRoute({
  summary: 'One\'s own counted minutes of required training: this week, and in all',
  ability: 'own.records',
  answer: ownMinutesView,
}, ({ work }) => readOwnMinutes(work, addDays(work.today, 1 - dayOfWeek(work.today))))
