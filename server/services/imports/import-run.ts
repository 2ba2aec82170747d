import { z } from 'zod'
import type { ImportAnswer, ImportQuery } from '#shared/schemas/imports'
import { Refusal } from '../refusal'
import type { NamedRow } from './columns'
import { readWrittenDate } from './written-dates'

export interface Rejected { row: number, field: string, why: string }
/** What one row comes to. */
export type Judged<Plan> = { plan: Plan } | { unchanged: true } | { field: string, why: string }

/** A date in a cell, in the order that the sender told. */
export const dateCell = (order: ImportQuery['dateOrder']) => z.string().transform((text, context) => {
  const read = readWrittenDate(text, order)
  if ('date' in read) return read.date
  context.addIssue({ code: 'custom', message: read.problem === 'dateOrder' ? 'could be two dates: tell the order of day and month' : 'is not a date' })
  return z.NEVER
})

/** Checks a row's cells with the schema; the first thing that is wrong rejects it. */
export function readRow<Row>(schema: z.ZodType<Row>, row: NamedRow): { value: Row } | { field: string, why: string } {
  if (row.surplus) return { field: 'row', why: 'has more cells than the header' }
  const parsed = schema.safeParse(row.values)
  if (parsed.success) return { value: parsed.data }
  const [issue] = parsed.error.issues
  return { field: issue!.path.join('.') || 'row', why: issue!.message }
}

/** Sorts the judged rows into what to save and what is rejected. */
export function gather<Plan>(rows: readonly NamedRow[], judge: (row: NamedRow) => Judged<Plan>): { plans: Plan[], rejected: Rejected[], unchanged: number } {
  const plans: Plan[] = []
  const rejected: Rejected[] = []
  let unchanged = 0
  for (const row of rows) {
    const judged = judge(row)
    if ('plan' in judged) plans.push(judged.plan)
    else if ('unchanged' in judged) unchanged++
    else rejected.push({ row: row.number, ...judged })
  }
  return { plans, rejected, unchanged }
}

/** All or nothing: with rejected rows nothing is saved unless they may be skipped; then 422 with the whole answer. */
export function requireWhole(answer: ImportAnswer, { dryRun, skipRejected }: ImportQuery): void {
  if (dryRun || skipRejected || answer.rejected.length === 0) return
  throw new Refusal('unprocessable', 'rejectedRows', { message: `${answer.rejected.length} rows can't be taken; nothing was saved`, data: { ...answer, created: 0, updated: 0 } })
}
