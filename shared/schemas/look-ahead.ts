import { z } from 'zod'
import { id } from './common'

export const lookAheadQuery = z.strictObject({ weeks: z.coerce.number().int().min(1).max(52).default(26), site: id.optional() })
export type LookAheadQuery = z.infer<typeof lookAheadQuery>
const named = z.object({ en: z.string(), es: z.string() })
export const lookAheadView = z.object({
  from: z.string(), to: z.string(),
  /** By date: whose card ends. */
  events: z.array(z.object({ date: z.string(), personId: z.string(), person: z.string(), crew: z.string().nullable(), type: z.string(), typeName: named, credentialId: z.string() })),
  /** Each crew with its usual places: the first day on which they can't be filled, and who renews what by when to prevent it. */
  crews: z.array(z.object({
    crewId: z.string(), name: z.string(), siteId: z.string(), site: z.string(), firstShortOn: z.string().nullable(),
    short: z.array(z.object({ duty: z.string(), count: z.number().int() })),
    renew: z.array(z.object({ personId: z.string(), person: z.string(), duty: z.string(), types: z.array(z.string()), by: z.string().nullable() })),
  })),
  /** What ends in each week, by type: the load on classes. Weeks are named by their Monday. */
  weeks: z.array(z.object({ monday: z.string(), types: z.array(z.object({ type: z.string(), count: z.number().int() })) })),
})
export type LookAheadView = z.infer<typeof lookAheadView>
