import { z } from 'zod'
import { code, date, flag, id, line, listOf, paging, text, timeZone } from './common'

/** How many of a duty a crew usually has. */
const slot = z.strictObject({ duty: code, count: z.number().int().min(1).max(200) })
const slots = z.array(slot).max(50)

export const newCrewBody = z.strictObject({ name: line(80), foremanId: id.nullish(), duties: slots.optional() })
export type NewCrewBody = z.infer<typeof newCrewBody>
export const crewChanges = z.strictObject({ name: line(80).optional(), foremanId: id.nullish(), duties: slots.optional() })
export type CrewChanges = z.infer<typeof crewChanges>
export const crewView = z.object({
  id: z.string(), name: z.string(), foremanId: z.string().nullable(), foremanName: z.string().nullable(),
  /** People now employed in it. */
  people: z.number().int(),
  duties: z.array(z.object({ duty: z.string(), count: z.number().int() })),
})
export type CrewView = z.infer<typeof crewView>
export const crewsView = listOf(crewView)

/** A site's public name: it stands on the poster and in its address. */
const siteCode = z.string().trim().regex(/^[A-Za-z0-9]+(-[A-Za-z0-9]+)*$/, 'letters, digits and dashes').max(40)
export const newSiteBody = z.strictObject({ code: siteCode, name: line(120), timeZone, address: text(400).nullish(), superintendentId: id.nullish() })
export type NewSiteBody = z.infer<typeof newSiteBody>
export const siteChanges = newSiteBody.partial()
export type SiteChanges = z.infer<typeof siteChanges>
export const siteView = z.object({ id: z.string(), code: z.string(), name: z.string(), timeZone: z.string(), address: z.string().nullable(), superintendentId: z.string().nullable() })
export type SiteView = z.infer<typeof siteView>
export const sitesView = listOf(siteView)

export const siteByCodeParams = z.strictObject({ code: z.string().min(1).max(60) })
/** All that the poster's page may know without a session. */
export const siteLandingView = z.object({ code: z.string(), name: z.string(), openBriefingId: z.string().optional() })

export const newAssignmentBody = z.strictObject({ personId: id.nullish(), crewId: id.nullish(), siteId: id, from: date, to: date.nullish() })
  .refine(body => !body.personId !== !body.crewId, { message: 'name a person or a crew, not both', path: ['personId'] })
export type NewAssignmentBody = z.infer<typeof newAssignmentBody>
export const assignmentChanges = z.strictObject({ siteId: id.optional(), from: date.optional(), to: date.nullish() })
export type AssignmentChanges = z.infer<typeof assignmentChanges>
export const assignmentView = z.object({ id: z.string(), personId: z.string().nullable(), crewId: z.string().nullable(), siteId: z.string(), from: z.string(), to: z.string().nullable() })
export type AssignmentView = z.infer<typeof assignmentView>
export const assignmentsView = listOf(assignmentView)
/** `from` and `to` ask for those that touch the days between, both included. */
export const assignmentsQuery = z.strictObject({ ...paging, site: id.optional(), crew: id.optional(), person: id.optional(), from: date.optional(), to: date.optional() })
export type AssignmentsQuery = z.infer<typeof assignmentsQuery>

export const namedListQuery = z.strictObject({ ...paging, q: z.string().trim().max(120).optional() })
export type NamedListQuery = z.infer<typeof namedListQuery>
export const previewQuery = z.strictObject({ preview: flag.optional() })
export type PreviewQuery = z.infer<typeof previewQuery>
