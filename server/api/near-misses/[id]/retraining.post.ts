import { idParams } from '#shared/schemas/common'
import { retrainingBody, retrainingView } from '#shared/schemas/retraining'
import { decideRetraining } from '../../../services/retraining'

export default defineRoute({
  summary: 'Decide who learns what again because of a report',
  ability: 'nearMiss.answer', params: idParams, body: retrainingBody, answer: retrainingView,
}, ({ work, params, body }) => decideRetraining(work, params.id, body))
