import { itemReviewModules, itemReviewModulesQuery } from '#shared/schemas/item-review'
import { listReviewable } from '~~/server/services/item-review'

export default defineRoute({
  summary: 'The modules with a quiz, with their graded attempts counted',
  ability: 'itemReview.read',
  query: itemReviewModulesQuery,
  answer: itemReviewModules,
}, async ({ work, query, event }) => listReviewable(work, await getTeaching(event), query.language ?? work.actor.language))
