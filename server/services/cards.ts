import { can } from '#shared/access/abilities'
import { startOfDay, firstInstantNotValid } from '#shared/domain/dates'
import { openBadgeClaims } from '#shared/domain/open-badge'
import { isCounting } from '#shared/domain/validity'
import { walletCard } from '../documents/wallet-card'
import { requireCredential } from './credentials'
import { Refusal } from './refusal'
import { loadSigningKey, publicJwkOf, signText } from './signing-key'
import type { Work } from './work'

async function requireCard(work: Work, id: string) {
  const { stored, item } = await requireCredential(work, id)
  if (!can(work.actor, 'credentials.readAll') && stored.personId !== work.actor.personId) throw new Refusal('forbidden', 'forbidden', { message: 'Only the holder and the safety manager get the card' })
  if (!isCounting(item.state)) throw new Refusal('conflict', 'notCounting', { message: 'Only a credential that counts today has a card', data: { state: item.state } })
  return { stored, item }
}

/** The wallet card of a credential that counts today (otherwise 409), for its holder and the safety manager. */
export async function makeCardPdf(work: Work, id: string, origin: string): Promise<{ body: Buffer, fileName: string, type: string }> {
  const { stored, item } = await requireCard(work, id)
  const { language } = work.actor
  const body = await walletCard(item, { language, company: work.company.name, code: stored.cardCode, url: `${origin}/verify/${stored.cardCode}`, today: work.today })
  return { body, type: 'application/pdf', fileName: `card-${item.type}.pdf` }
}

const part = (value: unknown) => Buffer.from(JSON.stringify(value)).toString('base64url')

/**
 * The open signed form of a card: an Open Badges 3.0 credential as a JSON Web Token (RFC 7515, RFC 8037) with the
 * company's key, which its header brings along. `nbf` is the day of issue and `exp` the first second that is no longer
 * good, both in the company's zone; no `exp` without an expiry.
 */
export async function makeCardToken(work: Work, id: string, origin: string): Promise<string> {
  const { stored, item } = await requireCard(work, id)
  const key = loadSigningKey(work.settings)
  const { timeZone, name } = work.company
  const claims = openBadgeClaims({
    origin, company: name, code: stored.cardCode, person: { id: stored.personId, name: item.person }, type: item.type, typeName: item.typeName, source: item.source,
    narrative: stored.verifiedBy ? 'The company looked at the holder\'s card and verified it.' : 'The holder passed the module\'s quiz and was signed off hands-on.',
    issuedOn: item.issuedOn, expiresOn: item.expiresOn, validFrom: startOfDay(item.issuedOn, timeZone), validUntil: item.expiresOn && firstInstantNotValid(item.expiresOn, timeZone),
  })
  const signed = `${part({ alg: 'EdDSA', typ: 'JWT', kid: key.keyId, jwk: publicJwkOf(key.publicKey) })}.${part(claims)}`
  return `${signed}.${signText(key, signed)}`
}
