import { idParams } from '#shared/schemas/common'
import { renewalRoundView } from '#shared/schemas/renewals'
import { readRound } from '../../../services/renewals'

export default defineRoute({
  summary: 'One renewal session with its people',
  ability: 'renewals.manage', params: idParams, answer: renewalRoundView,
}, ({ work, params }) => readRound(work, params.id))
