import { retrainingRuleBody, retrainingRuleParams, retrainingRulesView } from '#shared/schemas/retraining'
import { changeRetrainingRule } from '../../services/retraining'

export default defineRoute({
  summary: 'Change what a kind of report proposes to learn again',
  ability: 'nearMiss.answer', params: retrainingRuleParams, body: retrainingRuleBody, answer: retrainingRulesView,
}, ({ work, params, body }) => changeRetrainingRule(work, params.kind, body.modules))
