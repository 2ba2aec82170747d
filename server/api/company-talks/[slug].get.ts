import { companyTalkView, versionQuery } from '#shared/schemas/company-texts'
import { talkParams } from '#shared/schemas/talk'
import { readCompanyTalk } from '../../services/company-texts'

export default defineRoute({
  summary: 'A company\'s talk to be changed, with its versions',
  ability: 'companyTexts.write', params: talkParams, query: versionQuery, answer: companyTalkView,
}, ({ work, params, query }) => readCompanyTalk(work, { ...params, ...query }))
