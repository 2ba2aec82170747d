import { z } from 'zod'
import { employerKinds, roles } from '../domain/states'
import { date, email, flag, id, language, line, listOf, paging } from './common'

const phone = line(40).refine(text => /^[+()\d\s.\-x]{5,}$/i.test(text), 'must be a phone number')

const personFields = {
  /** As the person writes it. */
  name: line(120),
  badge: line(40),
  email: email.nullish(),
  phone: phone.nullish(),
  readsWell: z.boolean().nullish(),
  trade: line(80).nullish(),
  leftOn: date.nullish(),
  crewId: id.nullish(),
  /** What lists sort by, "Ferro, Dario"; computed from the name unless sent. */
  sortName: line(120).nullish(),
  /** Hidden: the day of turning 18. Written here, shown nowhere. */
  under18Until: date.nullish(),
  /** The asker's own password, when a role is granted that may change others' records. */
  currentPassword: z.string().min(1).max(1000).optional(),
}

/** What a new person lacks is filled in: a worker of the company itself, in the company's language, hired today. */
export const newPersonBody = z.strictObject({
  ...personFields,
  role: z.enum(roles).default('worker'),
  language: language.optional(),
  employer: line(120).optional(),
  employerKind: z.enum(employerKinds).default('own'),
  hiredOn: date.optional(),
})
export type NewPersonBody = z.infer<typeof newPersonBody>

/** `version` (as read) refuses a change over somebody else's. */
export const personChanges = z.strictObject({
  ...personFields,
  name: personFields.name.optional(),
  badge: personFields.badge.optional(),
  role: z.enum(roles).optional(),
  language: language.optional(),
  employer: line(120).optional(),
  employerKind: z.enum(employerKinds).optional(),
  hiredOn: date.optional(),
  version: z.number().int().optional(),
})
export type PersonChanges = z.infer<typeof personChanges>

export const personView = z.object({
  id: z.string(), name: z.string(), sortName: z.string(), badge: z.string(), email: z.string().nullable(), phone: z.string().nullable(),
  role: z.enum(roles), language, readsWell: z.boolean().nullable(), employer: z.string(), employerKind: z.enum(employerKinds), trade: z.string().nullable(),
  hiredOn: z.string(), leftOn: z.string().nullable(), crewId: z.string().nullable(), mergedInto: z.string().nullable(), version: z.number().int(),
  /** Whether they ever signed in: a join link is only for people who did not. */
  hasSignedIn: z.boolean(),
})
export type PersonView = z.infer<typeof personView>

export const peopleSorts = ['name', 'badge', 'role', 'employer', 'hiredOn', 'crew', 'trade'] as const
export const peopleQuery = z.strictObject({
  ...paging,
  /** Part of a name, a badge or an e-mail. */
  q: z.string().trim().max(120).optional(),
  crew: id.optional(),
  /** Rostered there today. */
  site: id.optional(),
  role: z.enum(roles).optional(),
  employed: flag.optional(),
  sort: z.enum([...peopleSorts, ...peopleSorts.map(name => `-${name}` as const)]).default('name'),
})
export type PeopleQuery = z.infer<typeof peopleQuery>
export const peopleView = listOf(personView)

export const mergeBody = z.strictObject({ into: id })
export type MergeBody = z.infer<typeof mergeBody>
const mergeEntry = z.object({ id: z.string(), name: z.string(), badge: z.string() })
/** Which entry is given up, which stays, and how many of its records move. */
export const mergeView = z.object({ from: mergeEntry, into: mergeEntry, moves: z.object({ credentials: z.number().int(), training: z.number().int(), signIns: z.number().int(), work: z.number().int(), other: z.number().int() }) })
export type MergeView = z.infer<typeof mergeView>
