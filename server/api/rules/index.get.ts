import { rulesQuery, rulesView } from '#shared/schemas/requirements'
import { readRules } from '../../services/rules'

export default defineRoute({
  summary: 'The rules: who asks for what',
  ability: 'requirements.read',
  query: rulesQuery,
  answer: rulesView,
}, ({ work, query }) => readRules(work, query))
