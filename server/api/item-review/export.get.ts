import { itemReviewExportQuery } from '#shared/schemas/item-review'
import { exportItemReview } from '~~/server/services/item-review-export'

export default defineRoute({
  summary: 'The review of a module\'s quiz items as CSV or XLSX',
  ability: 'itemReview.read',
  query: itemReviewExportQuery,
}, async ({ work, query, event }) => sendDownload(event, await exportItemReview(work, await getTeaching(event), { ...query, language: query.language ?? work.actor.language })))
