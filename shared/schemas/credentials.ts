import { z } from 'zod'
import { credentialStates, validityBases, type CredentialState } from '../domain/states'
import { code, date, flag, id, line, listOf, paging, text, exportFormats } from './common'

/** What a card may tell beyond its dates; never required to save, the law's gaps are shown as missing. */
export const credentialDetails = z.strictObject({
  trainer: text(200).optional(),
  evaluator: text(200).optional(),
  evaluatedOn: date.optional(),
  language: text(60).optional(),
  equipment: text(200).optional(),
  judgedBy: text(200).optional(),
  judgedOn: date.optional(),
})
export type CredentialDetails = z.infer<typeof credentialDetails>

/** A card as it is added; what its type asks for beside this is the service's to check. */
export const newCredential = z.strictObject({
  personId: id,
  type: code,
  issuedOn: date,
  expiresOn: date.nullish(),
  number: text(100).nullish(),
  issuer: text(200).nullish(),
  siteId: id.nullish(),
  fileId: id.nullish(),
  details: credentialDetails.nullish(),
})
export type NewCredential = z.infer<typeof newCredential>

/** `{ accept, note? }`: false keeps the card as rejected. */
export const verificationBody = z.strictObject({ accept: z.boolean(), note: text(1000).nullish() })
export const withdrawalBody = z.strictObject({ reason: text(1000) })

/** What a list can be sorted by; a minus turns it around. */
export const credentialSorts = ['person', 'credential', 'state', 'expiresOn', 'issuedOn', 'basis'] as const
const sorts = [...credentialSorts, ...credentialSorts.map(name => `-${name}` as const)]

const isState = (word: string): word is CredentialState => (credentialStates as readonly string[]).includes(word)
const stateList = z.string().transform((list, context) => {
  const words = list.split(',')
  if (words.every(isState)) return words
  context.addIssue({ code: 'custom', message: `must be of ${credentialStates.join(', ')}` })
  return z.NEVER
})

/** The filters that the list, its export, its calendar and the page's address share. */
export const credentialFilters = {
  /** One state, or several with commas. */
  state: stateList.optional(),
  within: z.coerce.number().int().min(0).max(3660).optional(),
  includeExpired: flag.optional(),
  site: id.optional(),
  crew: id.optional(),
  type: code.optional(),
  person: id.optional(),
  effective: flag.optional(),
  q: z.string().trim().max(100).optional(),
  sort: z.enum(sorts).optional(),
}
export const credentialFilterQuery = z.strictObject(credentialFilters)
export type CredentialFilters = z.infer<typeof credentialFilterQuery>
export const credentialListQuery = z.strictObject({ ...credentialFilters, ...paging })
export const credentialExportQuery = z.strictObject({ format: z.enum(exportFormats), ...credentialFilters })

const bilingual = z.object({ en: z.string(), es: z.string() })

/** One line of a list. `expiresOn` is the last good day that counts: a pour module's ends earlier without recent practice. */
export const credentialItem = z.object({
  id: z.string(),
  personId: z.string(),
  person: z.string(),
  sortName: z.string(),
  badge: z.string(),
  employer: z.string(),
  crew: z.string().nullable(),
  type: z.string(),
  typeName: bilingual,
  module: z.string().nullable(),
  basis: z.enum(validityBases),
  source: z.string(),
  issuedOn: date,
  expiresOn: date.nullable(),
  daysLeft: z.number().int().nullable(),
  state: z.enum(credentialStates),
  number: z.string().optional(),
  issuer: z.string().optional(),
  siteId: z.string().optional(),
  site: z.string().optional(),
  fileId: z.string().optional(),
  details: credentialDetails.optional(),
})
export type CredentialItem = z.infer<typeof credentialItem>
export const credentialList = listOf(credentialItem)

/** One credential with everything that its reader may know. */
export const credentialView = credentialItem.extend({
  /** The date on the card or computed from its type, before any rule about recent practice. */
  ownExpiresOn: date.nullable(),
  file: z.object({ id: z.string(), type: z.string(), size: z.number().int() }).nullable(),
  missingDetails: z.array(z.object({ field: z.string(), source: z.string() })),
  verifiedBy: z.string().nullable(),
  verifiedAt: z.string().nullable(),
  verificationNote: z.string().nullable(),
  withdrawnOn: z.string().nullable(),
  withdrawnBy: z.string().nullable(),
  withdrawalReason: z.string().nullable(),
  addedBy: z.string().nullable(),
  addedAt: z.string(),
  /** Only for the holder and the safety manager. */
  cardCode: z.string().nullable(),
  /** The person's other credentials of the same type, newest first. */
  others: z.array(z.object({ id: z.string(), issuedOn: date, expiresOn: date.nullable(), state: z.enum(credentialStates) })),
})
export type CredentialView = z.infer<typeof credentialView>

/** How many expire on each day, for the small timeline. */
export const expiryDays = z.object({ items: z.array(z.object({ date, count: z.number().int() })), total: z.number().int(), today: date })
export type ExpiryDays = z.infer<typeof expiryDays>

/** All that a stranger learns about a card. */
export const cardCheck = z.object({ valid: z.boolean(), type: z.string(), initials: z.string(), checkedOn: date })
export type CardCheck = z.infer<typeof cardCheck>
export const cardCodeParams = z.strictObject({ code: line(64) })

export const remindersBody = z.strictObject({ credentialIds: z.array(id).min(1, 'choose at least one').max(5000) })
export const remindersAnswer = z.object({
  queued: z.number().int(),
  /** Holders who have no address: their foreman is told instead. */
  withoutEmail: z.array(z.object({ personId: z.string(), name: z.string() })),
})

/** Filters that a calendar feed keeps; without them it holds everything its owner may see. */
export const calendarBody = z.strictObject({ filters: credentialFilterQuery.optional() })

/** The company's public Ed25519 keys as JWK (RFC 8037), by their RFC 7638 thumbprint. */
export const publicKeysView = z.object({ company: z.string(), keys: z.array(z.object({ keyId: z.string(), key: z.object({ kty: z.string(), crv: z.string(), x: z.string() }), isPresent: z.boolean() })) })
export type PublicKeysView = z.infer<typeof publicKeysView>
