import { renewalRoundBody, renewalRoundView } from '#shared/schemas/renewals'
import { bookRound } from '../../services/renewals'

export default defineRoute({
  summary: 'Book a renewal session and invite its people',
  ability: 'renewals.manage', body: renewalRoundBody, answer: renewalRoundView, status: 201,
}, ({ work, body }) => bookRound(work, body))
