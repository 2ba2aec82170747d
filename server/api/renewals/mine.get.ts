import { ownRenewalsView } from '#shared/schemas/renewals'
import { readOwnRenewals } from '../../services/renewals'

export default defineRoute({
  summary: 'One\'s own coming renewal sessions',
  ability: 'own.records', answer: ownRenewalsView,
}, ({ work }) => readOwnRenewals(work))
