import { idParams } from '#shared/schemas/common'
import { languageQuery, signOffRequestView } from '#shared/schemas/learning'
import { readSignOffRequest } from '../../services/sign-offs'

export default defineRoute({
  summary: 'One open request with the steps to go through',
  ability: 'signOff.give',
  params: idParams,
  query: languageQuery,
  answer: signOffRequestView,
}, async ({ work, params, query, event }) => readSignOffRequest(work, await getTeaching(event), { ...params, language: query.language ?? work.actor.language }))
