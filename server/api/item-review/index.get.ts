import { itemReviewQuery, itemReviewView } from '#shared/schemas/item-review'
import { reviewModuleItems } from '~~/server/services/item-review'

export default defineRoute({
  summary: 'How a module\'s quiz items did over every graded attempt',
  ability: 'itemReview.read',
  query: itemReviewQuery,
  answer: itemReviewView,
}, async ({ work, query, event }) => reviewModuleItems(work, await getTeaching(event), { ...query, language: query.language ?? work.actor.language }))
