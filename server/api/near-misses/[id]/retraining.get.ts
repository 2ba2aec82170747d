import { idParams } from '#shared/schemas/common'
import { retrainingView } from '#shared/schemas/retraining'
import { readRetraining } from '../../../services/retraining'

export default defineRoute({
  summary: 'What a report proposes to learn again, who was there, and what was decided',
  ability: 'nearMiss.answer', params: idParams, answer: retrainingView,
}, ({ work, params }) => readRetraining(work, params.id))
