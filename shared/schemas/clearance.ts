import { z } from 'zod'
import { clearanceStates, missingReasons } from '../domain/states'
import { code, date, id } from './common'

/**
 * Without a site: everybody rostered within the asker's reach. Without a date: today there. Without a duty: every duty.
 * With a person: that one alone, rostered or not.
 */
export const clearanceQuery = z.strictObject({ site: id.optional(), date: date.optional(), duty: code.optional(), person: id.optional() })
export type ClearanceQuery = z.infer<typeof clearanceQuery>
/** The same with what the board narrows on the screen: a crew, a state, part of a name. */
export const boardQuery = clearanceQuery.extend({ crew: id.optional(), state: z.enum(clearanceStates).optional(), q: z.string().trim().max(120).optional() })
export type BoardQuery = z.infer<typeof boardQuery>

const fix = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('verify'), type: z.string(), credentialId: z.string() }),
  z.object({ kind: z.literal('signOff'), module: z.string(), minutes: z.number().nullable() }),
  z.object({ kind: z.literal('module'), module: z.string(), minutes: z.number().nullable() }),
  z.object({ kind: z.literal('orientation'), type: z.string(), siteId: z.string().nullable() }),
  z.object({ kind: z.literal('card'), type: z.string() }),
  z.object({ kind: z.literal('wait'), type: z.string(), on: z.string() }),
  z.object({ kind: z.literal('safetyManager') }),
  z.object({ kind: z.literal('office') }),
  z.object({ kind: z.literal('none') }),
])

/** One thing in the way; `anyOf` is empty when it concerns the person, not a rule. */
export const missingView = z.object({
  anyOf: z.array(z.string()),
  why: z.object({ kind: z.enum(missingReasons), type: z.string().optional(), on: z.string().optional() }),
  fix,
})
export type MissingView = z.infer<typeof missingView>

export const dutyClearanceView = z.object({
  duty: z.string(),
  /** One of the duties that the person's crew usually does. */
  isOfCrew: z.boolean(),
  state: z.enum(clearanceStates),
  /** The last day on which this holds if nothing changes; null when nothing expires or when not cleared. */
  until: z.string().nullable(),
  missing: z.array(missingView),
})

export const clearanceView = z.object({
  date: z.string(),
  people: z.array(z.object({
    personId: z.string(), name: z.string(), crewId: z.string().nullable(),
    /** Where they are asked about; null away from any site. */
    siteId: z.string().nullable(), duties: z.array(dutyClearanceView),
  })),
})
export type ClearanceView = z.infer<typeof clearanceView>
