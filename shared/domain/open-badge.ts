import type { CalendarDate, Instant } from './dates'

/** What the company says of a card, in the open form. */
export interface OpenBadgeInput {
  origin: string
  company: string
  code: string
  person: { id: string, name: string }
  type: string
  typeName: { en: string, es: string }
  /** Where the interval comes from, and how the card came about, in plain words. */
  source: string
  narrative: string
  issuedOn: CalendarDate
  expiresOn: CalendarDate | null
  validFrom: Instant
  /** The first moment that is no longer good; null when it never expires. */
  validUntil: Instant | null
}

const seconds = (instant: Instant) => Math.floor(Date.parse(instant) / 1000)

/**
 * A card as an Open Badges 3.0 credential (1EdTech, final 1.0) on the W3C Verifiable Credentials Data Model 2.0, in the
 * shape of its JSON Web Token: the credential's members at the top, with iss, jti, sub, nbf and exp beside them.
 */
export function openBadgeClaims(card: OpenBadgeInput) {
  const id = `${card.origin}/verify/${card.code}`
  const subjectId = `${card.origin}/people/${card.person.id}`
  return {
    '@context': ['https://www.w3.org/ns/credentials/v2', 'https://purl.imsglobal.org/spec/ob/v3p0/context-3.0.3.json'],
    id,
    'type': ['VerifiableCredential', 'OpenBadgeCredential'],
    'name': card.typeName.en,
    'description': 'Company record, not a licence',
    'issuer': { id: card.origin, type: ['Profile'], name: card.company, url: card.origin },
    'validFrom': card.validFrom,
    ...(card.validUntil !== null && { validUntil: card.validUntil }),
    'credentialSubject': {
      id: subjectId,
      type: ['AchievementSubject'],
      identifier: [{ type: 'IdentityObject', identityHash: card.person.name, identityType: 'name', hashed: false }],
      achievement: {
        id: `${card.origin}/api/checks/types/${card.type}`,
        type: ['Achievement'],
        name: card.typeName.en,
        description: card.source,
        criteria: { narrative: card.narrative },
        inLanguage: 'en',
      },
    },
    'iss': card.origin, 'jti': id, 'sub': subjectId, 'nbf': seconds(card.validFrom),
    ...(card.validUntil !== null && { exp: seconds(card.validUntil) }),
  }
}
export type OpenBadgeClaims = ReturnType<typeof openBadgeClaims>
