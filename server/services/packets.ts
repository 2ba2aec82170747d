import { randomUUID } from 'node:crypto'
import type { Actor } from '#shared/access/abilities'
import { addDays, dateInZone } from '#shared/domain/dates'
import { canonicalSheet } from '#shared/domain/sheet'
import type { Language } from '#shared/domain/states'
import { isCounting } from '#shared/domain/validity'
import type { PacketBody, PacketContents, PacketLine, PacketView } from '#shared/schemas/packets'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { findPacket, insertPacket, insertPacketView, listPackets, mapTrades, revokePacket, type PacketRow } from '../data/packets'
import { isWithin } from '../data/reach'
import { getSite } from '../data/sites'
import { listBriefings } from '../data/views/briefing-list'
import { listCredentials } from '../data/views/credential-list'
import { mapNames } from '../data/views/names'
import { renderPacket } from '../documents/packet'
import { packetMail } from '../documents/packet-mail'
import { openClearanceBook } from './clearance'
import { randomToken, sha256 } from './hashing'
import { queueMail } from './mail'
import { badField, notFound, Refusal } from './refusal'
import { expectedPeople } from './roster'
import type { Work } from './work'

const longestDays = 366

async function requireSite(work: Work, siteId: string) {
  const site = await getSite(work.db, siteId)
  if (!site || !isWithin((await work.reach()).siteIds, site.id)) throw notFound('site')
  return site
}

async function credentialsOf(work: Work, personIds: readonly string[]) {
  const found = new Map<string, PacketContents['people'][number]['credentials']>()
  for (const personId of personIds) {
    const { items } = await listCredentials(work.db, { scope: { all: true }, today: work.today, personId, isEffective: true, sort: 'credential' }, { language: 'en', limit: 200, offset: 0 })
    found.set(personId, items.filter(item => isCounting(item.state)).map(({ typeName, basis, issuer, issuedOn, expiresOn, state }) => ({ name: typeName, basis, issuer: issuer ?? null, issuedOn, expiresOn, state })))
  }
  return found
}

/** The contents as they stand now: who is rostered at the site today, what they are cleared for and hold in date, its last sealed sheets. */
async function gather(work: Work, body: PacketBody): Promise<PacketContents> {
  const { db } = work
  const site = await requireSite(work, body.siteId)
  const date = dateInZone(work.now, site.timeZone)
  if (body.endsOn < date) throw badField('endsOn', 'has passed already at the site', 'endsInThePast')
  if (body.endsOn > addDays(date, longestDays)) throw badField('endsOn', `is more than ${longestDays} days away`, 'endsTooLate')
  const names = await mapNames(db)
  const crewIds = body.crewIds && new Set(body.crewIds)
  const people = (await expectedPeople(db, site.id, date)).filter(person => !crewIds || (person.crewId !== null && crewIds.has(person.crewId)))
  const ids = people.map(person => person.id)
  const book = await openClearanceBook(db, { whom: ids, date })
  const held = body.parts.includes('credentials') ? await credentialsOf(work, ids) : new Map<string, PacketContents['people'][number]['credentials']>()
  const facts = await mapTrades(db, ids)
  const sealed = body.parts.includes('sheets') ? (await listBriefings(db, { siteIds: [site.id], state: 'sealed', page: 1, perPage: body.sheets })).items : []
  return {
    version: 1, company: work.company.name, site: { code: site.code, name: site.name, address: site.address ?? null, timeZone: site.timeZone },
    madeOn: date, madeBy: work.actor.name, endsOn: body.endsOn, parts: [...new Set(body.parts)],
    people: people.map(person => ({
      name: person.name, employer: facts.get(person.id)?.employer ?? '', trade: facts.get(person.id)?.trade ?? null, crew: (person.crewId && names.crews.get(person.crewId)) || null,
      duties: !body.parts.includes('duties')
        ? []
        : book.duties.flatMap((duty) => {
            const { state, until } = book.ask(person.id, duty, site.id)
            return state === 'cleared' ? [{ name: names.duties[duty] ?? { en: duty, es: duty }, until }] : []
          }),
      credentials: held.get(person.id) ?? [],
    })),
    sheets: sealed.flatMap(row => (row.hash ? [{ date: row.date, talk: row.talkTitle, runBy: row.runBy, count: row.count, hash: row.hash }] : [])),
  }
}

/** What a packet would hold; keeps nothing. */
export const previewPacket = async (work: Work, body: PacketBody) => ({ contents: await gather(work, body) })

/**
 * Makes a site's packet: its contents are frozen with their SHA-256, and a link shows them until its last day or
 * until it is ended. 404 for a site out of reach, 422 for a last day that has passed or is over a year away.
 */
export async function makePacket(work: Work, body: PacketBody) {
  const contents = await gather(work, body)
  const token = randomToken()
  const text = canonicalSheet(contents)
  const row: PacketRow = { id: randomUUID(), tokenHash: sha256(token), siteId: body.siteId, madeBy: work.actor.personId, madeAt: work.now, endsOn: body.endsOn, revokedAt: null, body: text, hash: sha256(text) }
  const url = `${work.settings.linkOrigin}/packet/${token}`
  await work.db.transaction(async (trx) => {
    await insertPacket(trx, row)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'packet.made', subject: { kind: 'packet', id: row.id }, after: { siteId: body.siteId, endsOn: body.endsOn, parts: contents.parts, people: contents.people.length, sentTo: body.sendTo ?? null } })
    if (body.sendTo) await queueMail(trx, { key: `packet:${row.id}`, recipient: body.sendTo, personId: null, ...packetMail(work.company.language, { company: contents.company, site: contents.site.name, endsOn: body.endsOn, by: work.actor.name, url }), now: work.now })
  })
  return { id: row.id, url, hash: row.hash, contents }
}

const stateOf = (row: PacketRow & { timeZone: string }, now: string): PacketLine['state'] => (row.revokedAt ? 'revoked' : dateInZone(now, row.timeZone) > row.endsOn ? 'ended' : 'open')

/** The packets of the sites within reach, with who looked when. */
export async function readPackets(work: Work, { site, page, perPage }: { site?: string, page: number, perPage: number }) {
  const { siteIds } = await work.reach()
  if (site !== undefined) await requireSite(work, site)
  const { rows, total } = await listPackets(work.db, { siteIds: site === undefined ? siteIds : new Set([site]), page, perPage })
  return {
    total, page, perPage,
    items: rows.map((row): PacketLine => {
      const contents = JSON.parse(row.body) as PacketContents
      return { id: row.id, siteId: row.siteId, site: row.site, madeBy: row.maker, madeAt: row.madeAt, endsOn: row.endsOn, state: stateOf(row, work.now), parts: contents.parts, people: contents.people.length, hash: row.hash, views: row.views }
    }),
  }
}

/** Ends a packet's link for good. 404 out of reach, 409 when it was ended before. */
export async function endPacket(work: Work, id: string): Promise<void> {
  const row = await findPacket(work.db, { id })
  if (!row || !isWithin((await work.reach()).siteIds, row.siteId)) throw notFound('packet')
  await work.db.transaction(async (trx) => {
    if (!await revokePacket(trx, id, work.now)) throw new Refusal('conflict', 'alreadyEnded', { message: 'This link was ended already' })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'packet.ended', subject: { kind: 'packet', id } })
  })
}

/** The packet behind a link; 404 `packetEnded` once it ended, 404 for a word that no packet has. Every look is noted. */
async function open(db: Db, token: string, { part, now }: { part: 'page' | 'pdf', now: string }): Promise<PacketView> {
  const row = await findPacket(db, { tokenHash: sha256(token) })
  if (!row) throw notFound('packet')
  const contents = JSON.parse(row.body) as PacketContents
  if (stateOf({ ...row, timeZone: contents.site.timeZone }, now) !== 'open') throw new Refusal('notFound', 'packetEnded', { message: 'This link has ended' })
  await insertPacketView(db, { packetId: row.id, part, viewedAt: now })
  return { contents, hash: row.hash }
}

/** What a visitor with the link reads. */
export const viewPacket = (work: Work<Actor | null>, token: string): Promise<PacketView> => open(work.db, token, { part: 'page', now: work.now })

/** The same as a PDF. */
export async function packetPdf(work: Work<Actor | null>, token: string, { language, origin }: { language: Language, origin: string }) {
  const { contents, hash } = await open(work.db, token, { part: 'pdf', now: work.now })
  return { body: await renderPacket(contents, { hash, language, origin }), type: 'application/pdf', fileName: `packet-${contents.site.code}-${contents.madeOn}.pdf` }
}
