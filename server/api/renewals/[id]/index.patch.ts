import { idParams } from '#shared/schemas/common'
import { renewalRoundChanges, renewalRoundView } from '#shared/schemas/renewals'
import { changeRound } from '../../../services/renewals'

export default defineRoute({
  summary: 'Change or cancel a renewal session; everybody concerned is told',
  ability: 'renewals.manage', params: idParams, body: renewalRoundChanges, answer: renewalRoundView,
}, ({ work, params, body }) => changeRound(work, params.id, body))
