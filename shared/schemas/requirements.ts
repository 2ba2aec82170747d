import { z } from 'zod'
import { clearanceStates, designationKinds, validityAnchors, validityBases } from '../domain/states'
import { code, date, id, line, listOf, paging, text } from './common'

const names = z.strictObject({ en: line(80), es: line(80) })

export const newDutyBody = z.strictObject({ code, name: names, learningBeside: z.boolean().default(true), sameDayFix: z.boolean().default(true), recencyMonths: z.number().int().min(1).max(120).nullish() })
export type NewDutyBody = z.infer<typeof newDutyBody>
export const dutyChanges = z.strictObject({ name: names.optional(), learningBeside: z.boolean().optional(), sameDayFix: z.boolean().optional(), recencyMonths: z.number().int().min(1).max(120).nullish() })
export type DutyChanges = z.infer<typeof dutyChanges>
export const dutyView = z.object({ id: z.string(), code: z.string(), name: z.object({ en: z.string(), es: z.string() }), learningBeside: z.boolean(), sameDayFix: z.boolean(), recencyMonths: z.number().int().nullable() })
export type DutyView = z.infer<typeof dutyView>
export const dutiesView = listOf(dutyView)

const validity = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('never') }),
  z.strictObject({ kind: z.literal('period'), months: z.number().int().min(1).max(600), anchor: z.enum(validityAnchors).default('day') }),
  z.strictObject({ kind: z.literal('printed') }),
])
const leadDays = z.number().int().min(0).max(730)
export const newTypeBody = z.strictObject({ code, name: names, validity, basis: z.enum(validityBases), leadDays: leadDays.default(60), perSite: z.boolean().default(false), source: text(500), module: code.nullish() })
export type NewTypeBody = z.infer<typeof newTypeBody>
export const typeChanges = z.strictObject({ name: names.optional(), validity: validity.optional(), basis: z.enum(validityBases).optional(), leadDays: leadDays.optional(), perSite: z.boolean().optional(), source: text(500).optional() })
export type TypeChanges = z.infer<typeof typeChanges>
export const typeView = z.object({
  id: z.string(), code: z.string(), name: z.object({ en: z.string(), es: z.string() }),
  validity: z.object({ kind: z.enum(['never', 'period', 'printed']), months: z.number().int().optional(), anchor: z.enum(validityAnchors).optional() }),
  basis: z.enum(validityBases), leadDays: z.number().int(), perSite: z.boolean(), source: z.string(), module: z.string().nullable(),
})
export type TypeView = z.infer<typeof typeView>
export const typesView = listOf(typeView)

const appliesTo = z.union([
  z.strictObject({ everybody: z.literal(true) }),
  z.strictObject({ duty: code, site: id.optional() }),
  z.strictObject({ site: id }),
], 'needs everybody, a duty, a site, or a duty and a site')
const groups = z.array(z.array(code).min(1, 'a group needs a type').max(20)).min(1, 'needs a group').max(20)
export const newRuleBody = z.strictObject({ appliesTo, groups })
export type NewRuleBody = z.infer<typeof newRuleBody>
export const ruleChanges = newRuleBody.partial()
export type RuleChanges = z.infer<typeof ruleChanges>
export const ruleView = z.object({ id: z.string(), appliesTo: z.object({ everybody: z.literal(true).optional(), duty: z.string().optional(), site: z.string().optional() }), groups: z.array(z.array(z.string())) })
export type RuleView = z.infer<typeof ruleView>
export const rulesView = listOf(ruleView)
export const rulesQuery = z.strictObject(paging)

export const newDesignationBody = z.strictObject({ personId: id, kind: z.enum(designationKinds), subject: line(80), siteId: id.nullish(), authority: text(500), from: date, to: date.nullish() })
export type NewDesignationBody = z.infer<typeof newDesignationBody>
export const designationChanges = newDesignationBody.omit({ personId: true }).partial()
export type DesignationChanges = z.infer<typeof designationChanges>
export const designationView = z.object({ id: z.string(), personId: z.string(), name: z.string(), kind: z.enum(designationKinds), subject: z.string(), siteId: z.string().nullable(), authority: z.string(), from: z.string(), to: z.string().nullable() })
export type DesignationView = z.infer<typeof designationView>
export const designationsView = listOf(designationView)
export const designationsQuery = z.strictObject({ ...paging, person: id.optional(), site: id.optional(), kind: z.enum(designationKinds).optional() })
export type DesignationsQuery = z.infer<typeof designationsQuery>

export const newHoldBody = z.strictObject({ personId: id, from: date, to: date.nullish(), reason: text(1000) })
export type NewHoldBody = z.infer<typeof newHoldBody>
export const holdChanges = z.strictObject({ from: date.optional(), to: date.nullish(), reason: text(1000).optional() })
export type HoldChanges = z.infer<typeof holdChanges>
/** The reason is in the safety manager's answers only. */
export const holdView = z.object({ id: z.string(), personId: z.string(), name: z.string(), from: z.string(), to: z.string().nullable(), reason: z.string().optional() })
export type HoldView = z.infer<typeof holdView>
export const holdsView = listOf(holdView)
export const holdsQuery = z.strictObject({ ...paging, person: id.optional() })
export type HoldsQuery = z.infer<typeof holdsQuery>

const effect = z.object({ personId: z.string(), name: z.string(), duty: z.string(), siteId: z.string().nullable(), was: z.enum(clearanceStates), becomes: z.enum(clearanceStates) })
/** What a change would do to the people now rostered; nothing of it is saved. */
/** `nobodyLeft`: duties for which somebody is cleared now and nobody would be afterwards. */
export const previewView = z.object({ stops: z.array(effect), frees: z.array(effect), nobodyLeft: z.array(z.string()) })
export type PreviewView = z.infer<typeof previewView>
export type Effect = z.infer<typeof effect>
