import { itemParams, strikeBody, strikeView } from '#shared/schemas/item-review'
import { restoreItem } from '~~/server/services/item-strikes'

export default defineRoute({
  summary: 'Put a struck quiz item back into future draws',
  ability: 'itemReview.strike',
  params: itemParams,
  body: strikeBody,
  answer: strikeView,
}, async ({ work, params, body, event }) => restoreItem(work, await getTeaching(event), { itemId: params.item, reason: body.reason }))
