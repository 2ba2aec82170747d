import { idParams } from '#shared/schemas/common'
import { removeRule } from '../../services/rules'

export default defineRoute({
  summary: 'Take a rule away; the audit trail keeps what it asked for',
  ability: 'requirements.write',
  params: idParams,
  status: 204,
}, ({ work, params }) => removeRule(work, params.id))
