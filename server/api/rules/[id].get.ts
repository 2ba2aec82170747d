import { idParams } from '#shared/schemas/common'
import { ruleView } from '#shared/schemas/requirements'
import { requireRule } from '../../services/rules'

export default defineRoute({
  summary: 'One rule',
  ability: 'requirements.read',
  params: idParams,
  answer: ruleView,
}, ({ work, params }) => requireRule(work.db, params.id))
