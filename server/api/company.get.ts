import { companyView } from '#shared/schemas/company'

export default defineRoute({
  summary: 'The company\'s name and settings',
  ability: 'own.records',
  answer: companyView,
}, ({ work }) => work.company)
