import { cardCheck, cardCodeParams } from '#shared/schemas/credentials'
import { checkCard } from '~~/server/services/card-check'

export default definePublicRoute({
  summary: 'Is a card valid today; says nothing more',
  params: cardCodeParams,
  answer: cardCheck,
}, ({ work, params, event }) => checkCard(work, params.code, addressOf(event)))
