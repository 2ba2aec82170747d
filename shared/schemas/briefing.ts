import { z } from 'zod'
import { briefingStates, handReasons, signInMethods, workTags } from '../domain/states'
import { code, date, id, instant, language, line, paging, text } from './common'
import { mark } from './mark'
import { bilingual, bilingualCheck } from './talk'
import { weather } from './weather'

/** A client's own word for one thing it sends; sending it again changes nothing. */
export const clientKey = z.string().regex(/^[\w-]{8,64}$/, '8 to 64 letters, digits, - or _')

export const openBriefingBody = z.strictObject({
  id: z.uuid('must be a UUID').optional(),
  siteId: id,
  talk: code,
  work: z.array(z.enum(workTags)).max(workTags.length).transform(tags => [...new Set(tags)]),
  /** A pour's id: makes it a pour briefing. */
  pour: id.optional(),
  weather: weather.optional(),
  notes: text(2000).optional(),
  openedAt: instant.optional(),
  withoutSignal: z.boolean().optional(),
})
export type OpenBriefingBody = z.infer<typeof openBriefingBody>

export const visitor = z.strictObject({ name: line(120), company: line(120), host: line(120).optional() })
export type Visitor = z.infer<typeof visitor>

const common = { key: clientKey, mark }
const byTheLead = {
  ...common,
  personId: id.optional(),
  visitor: visitor.optional(),
  language: language.optional(),
  reason: z.enum(handReasons).optional(),
  signedAt: instant.optional(),
  withoutSignal: z.boolean().optional(),
}
/** A sign-in in each of its forms, by method. */
export const signInSheetBody = z.discriminatedUnion('method', [
  z.strictObject({
    ...common, method: z.literal('ownPhone'), admission: z.string().min(1).max(100), language,
    visitor: visitor.optional(), badge: line(40).optional(), pin: z.string().trim().min(1).max(20).optional(), session: z.literal(true).optional(), answer: z.string().max(40).optional(),
  }),
  z.strictObject({ ...byTheLead, method: z.literal('foremanDevice') }),
  z.strictObject({ ...byTheLead, method: z.literal('addedByForeman') }),
  z.strictObject({ ...byTheLead, method: z.literal('paper') }),
  z.strictObject({ ...common, method: z.literal('makeUp'), language: language.optional(), answer: z.string().max(40).optional() }),
])
export type SignInSheetBody = z.infer<typeof signInSheetBody>
export type OwnPhoneBody = Extract<SignInSheetBody, { method: 'ownPhone' }>
export type ByLeadBody = Extract<SignInSheetBody, { method: 'foremanDevice' | 'addedByForeman' | 'paper' }>
export type MakeUpBody = Extract<SignInSheetBody, { method: 'makeUp' }>

export const signInLine = z.object({
  id: z.string(),
  personId: z.string().optional(),
  visitor: visitor.optional(),
  name: z.string(),
  method: z.enum(signInMethods),
  signedAt: z.string(),
  late: z.boolean(),
  reason: z.enum(handReasons).optional(),
  language,
  mark: z.enum(['tap', 'typed', 'drawn', 'witnessed']),
  withoutSignal: z.boolean(),
})
export type SignInLine = z.infer<typeof signInLine>

/** After a check question was answered: never a bare wrong answer, always with its explanation. */
export const checkResult = z.object({ isRight: z.boolean(), right: z.string(), explain: bilingual })
export const signInAnswer = signInLine.extend({
  count: z.number().int(),
  isRepeat: z.boolean(),
  addendumId: z.string().optional(),
  check: checkResult.optional(),
})
export type SignInAnswer = z.infer<typeof signInAnswer>

const site = z.object({ id: z.string(), code: z.string(), name: z.string(), timeZone: z.string() })

/** A briefing for those who run or oversee it; somebody who signed in sees their own line, the count, and no `missing`. */
export const briefingView = z.object({
  id: z.string(),
  siteId: z.string(),
  site,
  date: z.string(),
  talk: z.string(),
  talkTitle: bilingual,
  /** The hash of the text that was read, when that text is still at hand; null otherwise. */
  talkHash: z.string().nullable(),
  check: bilingualCheck.nullable(),
  state: z.enum(briefingStates),
  work: z.array(z.enum(workTags)),
  openedAt: z.string(),
  closedAt: z.string().nullable(),
  sealedAt: z.string().nullable(),
  runBy: z.object({ id: z.string(), name: z.string() }),
  withoutSignal: z.boolean(),
  count: z.number().int(),
  signIns: z.array(signInLine),
  mayRun: z.boolean(),
  markAsked: z.enum(['tap', 'signature']),
  weather: weather.nullable().optional(),
  notes: z.string().nullable().optional(),
  expected: z.number().int().optional(),
  missing: z.array(z.string()).optional(),
  missingPeople: z.array(z.object({ personId: z.string(), name: z.string() })).optional(),
  sheet: z.object({ hash: z.string(), previousHash: z.string().nullable(), number: z.number().int(), addenda: z.number().int() }).nullable().optional(),
})
export type BriefingView = z.infer<typeof briefingView>

export const briefingsQuery = z.strictObject({ site: id.optional(), from: date.optional(), to: date.optional(), state: z.enum(briefingStates).optional(), ...paging })
export const briefingListItem = z.object({
  id: z.string(), siteId: z.string(), siteName: z.string(), date: z.string(), talk: z.string(), talkTitle: bilingual,
  state: z.enum(briefingStates), openedAt: z.string(), runBy: z.string(), count: z.number().int(), late: z.number().int(), hash: z.string().nullable(), timeZone: z.string(),
})
export type BriefingListItem = z.infer<typeof briefingListItem>

export const presenceView = z.object({ code: z.string(), url: z.string(), validUntil: z.string(), takenUntil: z.string(), secondsLeft: z.number() })
export type PresenceView = z.infer<typeof presenceView>

/** Digits as people type them: spaces are left out before they are compared. */
export const admissionBody = z.strictObject({ code: z.string().max(40).transform(code => code.replace(/\s/g, '')) })
export const admissionView = z.object({ admission: z.string(), until: z.string(), talk: z.string(), talkTitle: bilingual, check: bilingualCheck.nullable(), markAsked: z.enum(['tap', 'signature']), asksCheck: z.boolean() })
export type AdmissionView = z.infer<typeof admissionView>

export const closingBody = z.strictObject({ closedAt: instant.optional() }).default({})
export const sealingBody = z.strictObject({}).default({})
export const sealView = z.object({ sheetHash: z.string(), previousHash: z.string().nullable() })
export const addendumBody = z.strictObject({ text: text(4000) })
export const addendumView = z.object({ id: z.string(), hash: z.string(), previousHash: z.string().nullable(), number: z.number().int() })

export const sheetCheckView = z.object({
  intact: z.boolean(), site: z.string(), date: z.string(), count: z.number().int(),
  kind: z.enum(['sheet', 'addendum']), signature: z.enum(['valid', 'invalid', 'unknownKey', 'none']), clockWasSet: z.boolean(),
})
export type SheetCheckView = z.infer<typeof sheetCheckView>
export const sealedJson = z.object({ sheet: z.unknown(), previousHash: z.string().nullable(), hash: z.string(), signature: z.string().optional(), keyId: z.string().optional() })
export const sheetJsonView = sealedJson.extend({ publicKey: z.unknown(), addenda: z.array(sealedJson) })
