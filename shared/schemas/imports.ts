import { z } from 'zod'
import { flag } from './common'

/** `dryRun` saves nothing, `skipRejected` saves the good rows; `dateOrder` says how 03/04/2026 is meant. */
export const importQuery = z.strictObject({ dryRun: flag.default(false), skipRejected: flag.default(false), dateOrder: z.enum(['mdy', 'dmy']).optional() })
export type ImportQuery = z.infer<typeof importQuery>

/** Rows are numbered as in the file, the header being 1. `mapping` says which column was taken for what; null was not used. */
export const importAnswer = z.object({
  rows: z.number().int(),
  created: z.number().int(),
  updated: z.number().int(),
  unchanged: z.number().int(),
  rejected: z.array(z.object({ row: z.number().int(), field: z.string(), why: z.string() })),
  mapping: z.array(z.object({ header: z.string(), field: z.string().nullable() })),
  /** True when a date could be read in two ways: ask, then send `dateOrder`. */
  asksDateOrder: z.boolean(),
})
export type ImportAnswer = z.infer<typeof importAnswer>
