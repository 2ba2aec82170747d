import { idParams } from '#shared/schemas/common'
import { renewalBody, renewalRoundView } from '#shared/schemas/renewals'
import { renewAll } from '../../../services/renewals'

export default defineRoute({
  summary: 'Renew the cards of all who were at the session',
  ability: 'renewals.manage', params: idParams, body: renewalBody, answer: renewalRoundView,
}, ({ work, params, body }) => renewAll(work, params.id, body))
