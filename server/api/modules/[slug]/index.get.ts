import { languageQuery, moduleParams, moduleView } from '#shared/schemas/learning'
import { readModule } from '../../../services/modules'

export default defineRoute({
  summary: 'One module: lessons, quiz, hands-on, and how far one is',
  ability: 'learning.own',
  params: moduleParams,
  query: languageQuery,
  answer: moduleView,
}, async ({ work, params, query, event }) => readModule(work, await getTeaching(event), { ...params, language: query.language ?? work.actor.language }))
