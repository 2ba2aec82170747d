import { companyChanges, companyView } from '#shared/schemas/company'
import { changeCompany } from '../services/company'

export default defineRoute({
  summary: 'Change the company\'s settings',
  ability: 'settings.write',
  body: companyChanges,
  answer: companyView,
}, ({ work, body }) => changeCompany(work, body))
