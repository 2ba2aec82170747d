import { companyTalkBody, companyTalkView } from '#shared/schemas/company-texts'
import { addCompanyTalk } from '../../services/company-texts'

export default defineRoute({
  summary: 'Write a talk of the company\'s own',
  ability: 'companyTexts.write', body: companyTalkBody, answer: companyTalkView, status: 201,
}, ({ work, body }) => addCompanyTalk(work, body))
