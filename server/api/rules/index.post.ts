import { previewQuery } from '#shared/schemas/crews-and-sites'
import { newRuleBody, previewView, ruleView } from '#shared/schemas/requirements'
import { addRule } from '../../services/rules'

export default defineRoute({
  summary: 'Add a rule, or preview whom that would stop',
  ability: 'requirements.write',
  query: previewQuery,
  body: newRuleBody,
  answer: ruleView.or(previewView),
  status: 201,
  previews: true,
}, ({ work, body, query }) => addRule(work, body, query))
