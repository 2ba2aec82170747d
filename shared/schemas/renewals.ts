import { z } from 'zod'
import { code, date, id, line, text } from './common'
import { bilingual } from './talk'

const time = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'must be a time like 06:00')
const session = { siteId: id, place: line(200), trainer: line(120), date, time, minutes: z.number().int().min(10).max(600), seats: z.number().int().min(1).max(500) }

export const renewalSuggestionsQuery = z.strictObject({ weeks: z.coerce.number().int().min(1).max(104).default(26) })
export const renewalSuggestionsView = z.object({ items: z.array(z.object({
  type: z.string(), typeName: bilingual, module: z.string().nullable(), bookBy: z.string(),
  people: z.array(z.object({ personId: z.string(), name: z.string(), crew: z.string().nullable(), expiresOn: z.string() })),
})) })
export type RenewalSuggestions = z.infer<typeof renewalSuggestionsView>

export const renewalRoundBody = z.strictObject({ type: code, ...session, personIds: z.array(id).max(500) })
export type RenewalRoundBody = z.infer<typeof renewalRoundBody>
/** `version` is the one that was read: a change by somebody else in between is told (409). */
export const renewalRoundChanges = z.strictObject({ version: z.number().int(), ...z.object(session).partial().shape, personIds: z.array(id).max(500).optional(), cancel: text(500).optional() })
export type RenewalRoundChanges = z.infer<typeof renewalRoundChanges>
export const attendanceBody = z.strictObject({ present: z.array(id).max(500), absent: z.array(id).max(500) })
export type AttendanceBody = z.infer<typeof attendanceBody>
/** One action for all who were there: what the new cards say. `expiresOn` for printed types, `fileId` is the evidence. */
export const renewalBody = z.strictObject({ issuedOn: date.optional(), expiresOn: date.optional(), issuer: line(200).optional(), fileId: id.optional(), note: text(500).optional() })
export type RenewalBody = z.infer<typeof renewalBody>

export const renewalRoundView = z.object({
  id: z.string(), type: z.string(), typeName: bilingual, module: z.string().nullable(), isPrinted: z.boolean(),
  siteId: z.string(), site: z.string(), timeZone: z.string(), place: z.string(), trainer: z.string(), startsAt: z.string(), date: z.string(), time: z.string(), minutes: z.number().int(), seats: z.number().int(),
  state: z.enum(['planned', 'held', 'cancelled']), note: z.string().nullable(), version: z.number().int(),
  people: z.array(z.object({ personId: z.string(), name: z.string(), crew: z.string().nullable(), hasEmail: z.boolean(), state: z.enum(['invited', 'waiting', 'present', 'absent']), expiresOn: z.string().nullable(), credentialId: z.string().nullable() })),
})
export type RenewalRoundView = z.infer<typeof renewalRoundView>
export const renewalRoundsView = z.object({ items: z.array(renewalRoundView) })
export const ownRenewalsView = z.object({ items: z.array(z.object({ id: z.string(), typeName: bilingual, site: z.string(), timeZone: z.string(), place: z.string(), trainer: z.string(), startsAt: z.string(), minutes: z.number().int(), state: z.enum(['invited', 'waiting']) })) })
export type OwnRenewals = z.infer<typeof ownRenewalsView>
