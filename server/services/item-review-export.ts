import type { ItemReviewQuestion } from '#shared/schemas/item-review'
import { itemReviewCsv, itemReviewSheet, itemReviewWords } from '../documents/item-review'
import type { Download } from './credential-export'
import { refuseWithheld, reviewModuleItems } from './item-review'
import type { Teaching } from './teaching'
import type { Work } from './work'

/** The table of the review as a file, as it is filtered. 404 and 409 as the review of one item. */
export async function exportItemReview(work: Work, teaching: Teaching, { format, ...question }: ItemReviewQuestion & { format: 'csv' | 'xlsx' }): Promise<Download> {
  const { items, module } = await reviewModuleItems(work, teaching, question)
  await refuseWithheld(work, module.slug)
  const { language, takenIn } = question
  const fileName = `${itemReviewWords[language].fileName}-${module.slug}${takenIn === 'all' ? '' : `-${takenIn}`}-${work.today}.${format}`
  return format === 'csv'
    ? { body: itemReviewCsv(items, language), type: 'text/csv; charset=utf-8', fileName }
    : { body: await itemReviewSheet(items, language), type: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet', fileName }
}
