import { z } from 'zod'
import { credentialStates, validityBases } from '../domain/states'
import { date, email, id, listOf, paging } from './common'
import { bilingual } from './talk'

/** What may be left out; people are always in it. */
export const packetParts = ['duties', 'credentials', 'sheets'] as const
export type PacketPart = (typeof packetParts)[number]

export const packetBody = z.strictObject({
  siteId: id,
  /** The last day on which the link works, in the site's zone. */
  endsOn: date,
  parts: z.array(z.enum(packetParts)).max(3),
  /** How many of the site's last sealed sheets. */
  sheets: z.number().int().min(1).max(60).default(10),
  crewIds: z.array(id).max(50).optional(),
  /** Mails the link to this address. */
  sendTo: email.optional(),
})
export type PacketBody = z.infer<typeof packetBody>

/** What is handed over. No contact data, language, birth date, score, failed answer, near miss, hold or reason is in it. */
export const packetContents = z.object({
  version: z.literal(1),
  company: z.string(),
  site: z.object({ code: z.string(), name: z.string(), address: z.string().nullable(), timeZone: z.string() }),
  madeOn: z.string(), madeBy: z.string(), endsOn: z.string(),
  parts: z.array(z.enum(packetParts)),
  people: z.array(z.object({
    name: z.string(), employer: z.string(), trade: z.string().nullable(), crew: z.string().nullable(),
    duties: z.array(z.object({ name: bilingual, until: z.string().nullable() })),
    credentials: z.array(z.object({ name: bilingual, basis: z.enum(validityBases), issuer: z.string().nullable(), issuedOn: z.string(), expiresOn: z.string().nullable(), state: z.enum(credentialStates) })),
  })),
  sheets: z.array(z.object({ date: z.string(), talk: bilingual, runBy: z.string(), count: z.number().int(), hash: z.string() })),
})
export type PacketContents = z.infer<typeof packetContents>

export const packetPreview = z.object({ contents: packetContents })
export const packetMade = z.object({ id: z.string(), url: z.string(), hash: z.string(), contents: packetContents })
export const packetLine = z.object({
  id: z.string(), siteId: z.string(), site: z.string(), madeBy: z.string(), madeAt: z.string(), endsOn: z.string(), state: z.enum(['open', 'ended', 'revoked']),
  parts: z.array(z.enum(packetParts)), people: z.number().int(), hash: z.string(),
  views: z.array(z.object({ part: z.enum(['page', 'pdf']), viewedAt: z.string() })),
})
export type PacketLine = z.infer<typeof packetLine>
export const packetList = listOf(packetLine)
export const packetQuery = z.strictObject({ site: id.optional(), ...paging })
/** What a visitor with the link is shown. */
export const packetView = z.object({ contents: packetContents, hash: z.string() })
export type PacketView = z.infer<typeof packetView>
