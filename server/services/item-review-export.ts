import type { ExportFormat } from '#shared/schemas/common'
import type { ItemReviewQuestion } from '#shared/schemas/item-review'
import { itemReviewTable } from '../documents/item-review'
import { refuseWithheld, reviewModuleItems } from './item-review'
import { exportTable, type Download } from './table-export'
import type { Teaching } from './teaching'
import type { Work } from './work'

/** The table of the review as a file, as it is filtered. 404 and 409 as the review of one item. */
export async function exportItemReview(work: Work, teaching: Teaching, { format, ...question }: ItemReviewQuestion & { format: ExportFormat }): Promise<Download> {
  const { items, module } = await reviewModuleItems(work, teaching, question)
  await refuseWithheld(work, module.slug)
  const table = itemReviewTable(items, question.language)
  const { takenIn } = question
  return exportTable(work, format, { ...table, fileName: `${table.fileName}-${module.slug}${takenIn === 'all' ? '' : `-${takenIn}`}` })
}
