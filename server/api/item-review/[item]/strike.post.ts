import { previewQuery } from '#shared/schemas/crews-and-sites'
import { itemParams, strikeBody, strikeView } from '#shared/schemas/item-review'
import { strikeItem } from '~~/server/services/item-strikes'

export default defineRoute({
  summary: 'Take a quiz item out of future draws and, in the pass direction, of past scores; or preview that',
  ability: 'itemReview.strike',
  params: itemParams,
  query: previewQuery,
  body: strikeBody,
  answer: strikeView,
}, async ({ work, params, query, body, event }) => strikeItem(work, await getTeaching(event), { itemId: params.item, reason: body.reason, preview: query.preview }))
