import { companyToday } from '#shared/schemas/company'

export default defineRoute({
  summary: 'The company\'s name and settings',
  ability: 'own.records',
  answer: companyToday,
}, ({ work }) => ({ ...work.company, today: work.today }))
