import { companyTalkChanges, companyTalkView } from '#shared/schemas/company-texts'
import { talkParams } from '#shared/schemas/talk'
import { changeCompanyTalk } from '../../services/company-texts'

export default defineRoute({
  summary: 'Save the next version of a company\'s talk, or retire it',
  ability: 'companyTexts.write', params: talkParams, body: companyTalkChanges, answer: companyTalkView,
}, ({ work, params, body }) => changeCompanyTalk(work, params.slug, body))
