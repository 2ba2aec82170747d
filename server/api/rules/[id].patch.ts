import { idParams } from '#shared/schemas/common'
import { previewQuery } from '#shared/schemas/crews-and-sites'
import { previewView, ruleChanges, ruleView } from '#shared/schemas/requirements'
import { changeRule } from '../../services/rules'

export default defineRoute({
  summary: 'Change a rule, or preview whom that would stop',
  ability: 'requirements.write',
  params: idParams,
  query: previewQuery,
  body: ruleChanges,
  answer: ruleView.or(previewView),
}, ({ work, params, body, query }) => changeRule(work, params.id, body, query))
