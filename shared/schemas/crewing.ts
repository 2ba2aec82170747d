import { z } from 'zod'
import { designationKinds } from '../domain/states'
import { code, date, id } from './common'

const slot = z.strictObject({ duty: code, count: z.number().int().min(0).max(50) })
const requirement = z.union([z.strictObject({ type: code }), z.strictObject({ designation: z.enum(designationKinds), subject: code })])

/** A work day's question: slots, who must be on site, and optionally other people than the roster, and placements by hand. */
export const crewingBody = z.strictObject({
  siteId: id, date, slots: z.array(slot).min(1).max(30), presence: z.array(requirement).max(20).optional(),
  personIds: z.array(id).max(500).optional(), locked: z.array(z.strictObject({ duty: code, personId: id })).max(200).optional(),
})
export type CrewingBody = z.infer<typeof crewingBody>
const count = z.object({ duty: z.string(), count: z.number().int() })
export const crewingView = z.object({
  crewed: z.boolean(),
  assignment: z.array(z.object({ duty: z.string(), personId: z.string(), beside: z.string().optional() })),
  short: z.array(count), unfillable: z.array(count).optional(),
  because: z.object({ duties: z.array(z.string()), people: z.array(z.string()) }).optional(),
  presenceMissing: z.array(requirement),
  fix: z.object({ minutes: z.number().int(), steps: z.array(z.object({ personId: z.string(), duty: z.string(), modules: z.array(z.string()) })) }).optional(),
})
export type CrewingView = z.infer<typeof crewingView>

export const usualQuery = z.strictObject({ site: id, date: date.optional() })
/** A day's usual slots at a site (those saved for the crews rostered there), and the people rostered. */
export const usualView = z.object({ date: z.string(), slots: z.array(count), people: z.array(z.object({ id: z.string(), name: z.string(), crewId: z.string().nullable() })) })
export type UsualView = z.infer<typeof usualView>

export const invitationBody = z.strictObject({ steps: z.array(z.strictObject({ personId: id, modules: z.array(code).min(1).max(16) })).min(1).max(100) })
export type InvitationBody = z.infer<typeof invitationBody>
export const invitationView = z.object({ queued: z.number().int(), withoutEmail: z.array(z.object({ personId: z.string(), name: z.string() })) })
