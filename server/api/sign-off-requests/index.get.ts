import { languageQuery, signOffRequestList } from '#shared/schemas/learning'
import { listSignOffRequests } from '../../services/sign-offs'

export default defineRoute({
  summary: 'Open requests of people whom one may assess',
  ability: 'signOff.give',
  query: languageQuery,
  answer: signOffRequestList,
}, async ({ work, query, event }) => listSignOffRequests(work, await getTeaching(event), query.language ?? work.actor.language))
