import { z } from 'zod'
import { flag } from './common'

/**
 * `dryRun` saves nothing, `skipRejected` saves the good rows; `dateOrder` says how 03/04/2026 is meant; `columns` is a JSON
 * object of header and field ('' for not used) where the usual words don't tell; `key` is what its progress is asked with.
 */
export const importQuery = z.strictObject({ dryRun: flag.default(false), skipRejected: flag.default(false), dateOrder: z.enum(['mdy', 'dmy']).optional(), columns: z.string().max(8000).optional(), key: z.string().min(8).max(64).optional() })
export type ImportQuery = z.infer<typeof importQuery>

/** Rows are numbered as in the file, the header being 1. `mapping` says which column was taken for what; null was not used. */
export const importAnswer = z.object({
  rows: z.number().int(),
  created: z.number().int(),
  updated: z.number().int(),
  unchanged: z.number().int(),
  rejected: z.array(z.object({ row: z.number().int(), field: z.string(), why: z.string(), code: z.string() })),
  mapping: z.array(z.object({ header: z.string(), field: z.string().nullable() })),
  /** What a column may be taken for. */
  fields: z.array(z.string()),
  /** True when a date could be read in two ways: ask, then send `dateOrder`. */
  asksDateOrder: z.boolean(),
})
export type ImportAnswer = z.infer<typeof importAnswer>

export const importProgressQuery = z.strictObject({ key: z.string().min(8).max(64) })
/** How far one's own import has come; `total` 0 while the file is read. */
export const importProgress = z.object({ phase: z.enum(['reading', 'checking', 'saving']), done: z.number().int(), total: z.number().int() })
export type ImportProgress = z.infer<typeof importProgress>
