import { z } from 'zod'
import { line } from './common'

const point = z.tuple([z.number().min(0).max(1), z.number().min(0).max(1)])
const mostPoints = 6000

/** A drawn signature: strokes of points from 0 to 1 across and down the field, without timing. */
export const strokes = z.array(z.array(point).min(1).max(2000)).min(1, 'is empty').max(100)
  .refine(all => all.reduce((sum, stroke) => sum + stroke.length, 0) >= 2, 'is empty')
  .refine(all => all.reduce((sum, stroke) => sum + stroke.length, 0) <= mostPoints, `at most ${mostPoints} points`)

/** What somebody leaves on a sheet or a sign-off. `by` is the witness: a person's id, or a name. */
export const mark = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('tap') }),
  z.strictObject({ kind: z.literal('typed'), text: line(100) }),
  z.strictObject({ kind: z.literal('drawn'), strokes }),
  z.strictObject({ kind: z.literal('witnessed'), by: line(200) }),
])
export type Mark = z.infer<typeof mark>
