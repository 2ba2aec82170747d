import { retrainingRulesView } from '#shared/schemas/retraining'
import { readRetrainingRules } from '../../services/retraining'

export default defineRoute({
  summary: 'What each kind of report proposes to learn again',
  ability: 'nearMiss.answer', answer: retrainingRulesView,
}, ({ work }) => readRetrainingRules(work))
