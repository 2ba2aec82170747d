import { idParams } from '#shared/schemas/common'
import { dutyView } from '#shared/schemas/requirements'
import { requireDuty } from '../../services/duties'

export default defineRoute({
  summary: 'One duty, by id or code',
  ability: 'requirements.read',
  params: idParams,
  answer: dutyView,
}, ({ work, params }) => requireDuty(work.db, params.id))
