import { importProgress, importProgressQuery } from '#shared/schemas/imports'
import { readProgress } from '~~/server/services/imports/progress'

export default defineRoute({
  summary: 'How far one\'s own running import has come',
  ability: 'imports.run', query: importProgressQuery, answer: importProgress,
}, ({ work, query }) => readProgress(work.actor.personId, query.key))
