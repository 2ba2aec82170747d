import { renewalRoundsView } from '#shared/schemas/renewals'
import { readRounds } from '../../services/renewals'

export default defineRoute({
  summary: 'Booked renewal sessions, the latest first',
  ability: 'renewals.manage', answer: renewalRoundsView,
}, ({ work }) => readRounds(work))
