import { languageQuery, lessonParams } from '#shared/schemas/learning'
import { markRead } from '../../../../../services/modules'

export default defineRoute({
  summary: 'The lesson was read to its end',
  ability: 'learning.own',
  params: lessonParams,
  query: languageQuery,
  status: 204,
}, async ({ work, params, query, event }) => markRead(work, await getTeaching(event), { ...params, language: query.language ?? work.actor.language }))
