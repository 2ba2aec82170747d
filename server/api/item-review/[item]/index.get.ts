import { itemDetailQuery, itemDetailView, itemParams } from '#shared/schemas/item-review'
import { readItem } from '~~/server/services/item-detail'

export default defineRoute({
  summary: 'One quiz item with its key, what was picked, and its strikes',
  ability: 'itemReview.read',
  params: itemParams,
  query: itemDetailQuery,
  answer: itemDetailView,
}, async ({ work, params, query, event }) => readItem(work, await getTeaching(event), { itemId: params.item, takenIn: query.takenIn, language: query.language ?? work.actor.language }))
