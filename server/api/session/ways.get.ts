import { ownWaysView } from '#shared/schemas/session'
import { readOwnWays } from '../../services/own-sign-in'

export default defineRoute({
  summary: 'One\'s own ways in: badge, e-mail, and which secrets are set',
  ability: 'own.records',
  answer: ownWaysView,
}, ({ work }) => readOwnWays(work))
