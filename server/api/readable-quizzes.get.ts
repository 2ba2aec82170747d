import { languageQuery } from '#shared/schemas/learning'
import { readableList } from '#shared/schemas/training'
import { listReadable } from '../services/assessor-talks'

export default defineRoute({
  summary: 'To whom one may read a quiz aloud, and of which modules',
  ability: 'signOff.give',
  query: languageQuery,
  answer: readableList,
}, async ({ work, query, event }) => listReadable(work, await getTeaching(event), query.language ?? work.actor.language))
