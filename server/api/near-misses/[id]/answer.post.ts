import { idParams } from '#shared/schemas/common'
import { nearMissAnswer, nearMissView } from '#shared/schemas/near-misses'
import { decideNearMiss } from '../../../services/near-misses'

export default defineRoute({
  summary: 'Say what was done about a report',
  ability: 'nearMiss.answer', params: idParams, body: nearMissAnswer, answer: nearMissView,
}, ({ work, params, body }) => decideNearMiss(work, params.id, body.answer))
