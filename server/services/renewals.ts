import { randomUUID } from 'node:crypto'
import { addDays, compareInstants, dateInZone, instantAt } from '#shared/domain/dates'
import { renewalGroups, seatsFor } from '#shared/domain/renewals'
import { expiryOf, printedDateProblem } from '#shared/domain/validity'
import type { AttendanceBody, OwnRenewals, RenewalBody, RenewalRoundBody, RenewalRoundChanges, RenewalRoundView, RenewalSuggestions } from '#shared/schemas/renewals'
import { appendAudit } from '../data/audit'
import { findCredentialType, insertCredential, listStoredTypes, type StoredType } from '../data/credentials'
import type { Db } from '../data/database'
import { findFile } from '../data/files'
import { listEmployed } from '../data/roster'
import { deleteSeat, insertRound, insertSeat, listRounds, listSeated, listSeats, updateRound, updateSeat, type NamedSeat, type RoundRow } from '../data/renewals'
import { getSite } from '../data/sites'
import { listCredentialIds, listCredentialsByIds } from '../data/views/credential-list'
import { renewalMail, type RenewalNews } from '../documents/renewal-mail'
import { toCredentialQuery } from './credentials'
import { randomCode } from './hashing'
import { queueMail } from './mail'
import { badField, notFound, Refusal } from './refusal'
import type { Work } from './work'

/** Whose cards end in the coming weeks, by type, with the latest day to book; those who have a seat are left out. */
export async function suggestRenewals(work: Work, { weeks }: { weeks: number }): Promise<RenewalSuggestions> {
  const { db, today } = work
  const ids = await listCredentialIds(db, await toCredentialQuery(work, { within: weeks * 7, includeExpired: true, effective: true, sort: 'expiresOn' }), 'en')
  const items = []
  for (let start = 0; start < ids.length; start += 500) items.push(...await listCredentialsByIds(db, ids.slice(start, start + 500), today))
  const types = new Map((await listStoredTypes(db)).map(type => [type.code, type]))
  const endings = items.flatMap(item => (item.expiresOn === null || types.get(item.type)?.perSite ? [] : [{ ...item, expiresOn: item.expiresOn }]))
  return {
    items: renewalGroups(endings, { today, seated: await listSeated(db, work.now) }).map(group => ({
      type: group.type, typeName: group.lines[0]!.typeName, module: types.get(group.type)?.module ?? null, bookBy: group.bookBy,
      people: group.lines.map(line => ({ personId: line.personId, name: line.person, crew: line.crew ?? null, expiresOn: line.expiresOn })),
    })),
  }
}

async function toViews(db: Db, rounds: readonly RoundRow[]): Promise<RenewalRoundView[]> {
  const types = new Map((await listStoredTypes(db)).map(type => [type.id, type]))
  const seats = await listSeats(db, rounds.map(round => round.id))
  const views: RenewalRoundView[] = []
  for (const { typeId, createdBy: _by, createdAt: _at, ...round } of rounds) {
    const type = types.get(typeId)!
    const site = (await getSite(db, round.siteId))!
    views.push({
      ...round, type: type.code, typeName: type.name, module: type.module ?? null, isPrinted: type.validity.kind === 'printed', site: site.name, timeZone: site.timeZone,
      date: dateInZone(round.startsAt, site.timeZone), time: new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone: site.timeZone }).format(new Date(round.startsAt)),
      people: seats.filter(seat => seat.roundId === round.id).map(({ personId, name, crew, email, state, expiresOn, credentialId }) => ({ personId, name, crew, hasEmail: email !== null, state, expiresOn, credentialId })),
    })
  }
  return views
}

/** Every session, the latest first. */
export const readRounds = async (work: Work) => ({ items: await toViews(work.db, await listRounds(work.db)) })

/** One session. 404 for no such. */
export async function readRound(work: Work, id: string): Promise<RenewalRoundView> {
  const rounds = await listRounds(work.db, { id })
  if (rounds.length === 0) throw notFound('session')
  return (await toViews(work.db, rounds))[0]!
}

/** The actor's own coming sessions. */
export async function readOwnRenewals(work: Work): Promise<OwnRenewals> {
  const views = await toViews(work.db, await listRounds(work.db, { personId: work.actor.personId, from: `${addDays(dateInZone(work.now, 'UTC'), -1)}T00:00:00Z` }))
  return {
    items: views.filter(view => view.state === 'planned').flatMap((view) => {
      const seat = view.people.find(person => person.personId === work.actor.personId)
      return seat && (seat.state === 'invited' || seat.state === 'waiting') ? [{ id: view.id, typeName: view.typeName, site: view.site, timeZone: view.timeZone, place: view.place, trainer: view.trainer, startsAt: view.startsAt, minutes: view.minutes, state: seat.state }] : []
    }).reverse(),
  }
}

async function tell(trx: Db, work: Work, round: RoundRow, type: StoredType, told: readonly { seat: NamedSeat, news: RenewalNews }[]): Promise<void> {
  const site = (await getSite(trx, round.siteId))!
  for (const { seat, news } of told) {
    if (!seat.email) continue
    const session = { ...round, credential: type.name[seat.language], site: site.name, timeZone: site.timeZone, link: `${work.settings.linkOrigin}/my-cards` }
    await queueMail(trx, { key: `renewal:${round.id}:${round.version}:${seat.personId}:${news}`, recipient: seat.email, personId: seat.personId, ...renewalMail(session, { news, name: seat.name, language: seat.language, now: work.now }), now: work.now })
  }
}

async function requireSession(work: Work, body: { siteId: string, date: string, time: string }): Promise<string> {
  const site = await getSite(work.db, body.siteId)
  if (!site) throw badField('siteId', 'is not a site', 'unknownSite')
  const startsAt = instantAt(body.date, body.time, site.timeZone)
  if (compareInstants(startsAt, work.now) < 0) throw badField('date', 'has passed already', 'hasPassed')
  return startsAt
}

async function requirePeople(work: Work, personIds: readonly string[], date: string): Promise<void> {
  const employed = new Set((await listEmployed(work.db, date)).map(person => person.id))
  if (personIds.some(id => !employed.has(id))) throw badField('personIds', 'holds somebody who does not work here that day')
}

/** Books a session and invites its people by mail in their language, with a calendar entry; beyond the seats they wait. 422 for what does not fit. */
export async function bookRound(work: Work, body: RenewalRoundBody): Promise<RenewalRoundView> {
  const type = await findCredentialType(work.db, body.type)
  if (!type) throw badField('type', 'is not a credential type', 'unknownType')
  const startsAt = await requireSession(work, body)
  const personIds = [...new Set(body.personIds)]
  await requirePeople(work, personIds, body.date)
  const id = randomUUID()
  await work.db.transaction(async (trx) => {
    await insertRound(trx, { id, typeId: type.id, siteId: body.siteId, place: body.place, trainer: body.trainer, startsAt, minutes: body.minutes, seats: body.seats, createdBy: work.actor.personId, createdAt: work.now })
    for (const [index, personId] of personIds.entries()) await insertSeat(trx, { roundId: id, personId, state: index < body.seats ? 'invited' : 'waiting', addedAt: work.now })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'renewal.booked', subject: { kind: 'renewal', id }, after: { ...body, startsAt } })
    const [round] = await listRounds(trx, { id })
    await tell(trx, work, round!, type, (await listSeats(trx, [id])).map(seat => ({ seat, news: seat.state === 'invited' ? 'invited' as const : 'waiting' as const })))
  })
  return readRound(work, id)
}

async function typeOf(db: Db, round: RoundRow): Promise<StoredType> {
  return (await listStoredTypes(db)).find(type => type.id === round.typeId)!
}

async function requirePlanned(trx: Db, id: string): Promise<RoundRow> {
  const [round] = await listRounds(trx, { id })
  if (!round) throw notFound('session')
  if (round.state !== 'planned') throw new Refusal('conflict', 'notPlanned', { message: 'This session was held or cancelled' })
  return round
}

/** Seats anew after a change: those who lost or won a seat are told so, the others hear of a change of time or place. */
async function reseat(trx: Db, work: Work, round: RoundRow, personIds: readonly string[] | undefined, isMoved: boolean): Promise<void> {
  const before = await listSeats(trx, [round.id])
  const kept = personIds ? before.filter(seat => personIds.includes(seat.personId)) : before
  for (const seat of before) if (!kept.includes(seat)) await deleteSeat(trx, round.id, seat.personId)
  for (const personId of personIds ?? []) await insertSeat(trx, { roundId: round.id, personId, state: 'waiting', addedAt: work.now })
  const now = await listSeats(trx, [round.id])
  const states = seatsFor(now.map(seat => ({ personId: seat.personId, isInvited: seat.state === 'invited' })), round.seats)
  for (const seat of now) await updateSeat(trx, seat, { state: states.get(seat.personId)! })
  const was = new Map(before.map(seat => [seat.personId, seat.state]))
  const told = now.flatMap((seat): { seat: NamedSeat, news: RenewalNews }[] => {
    const state = states.get(seat.personId)!
    if (state === was.get(seat.personId)) return isMoved && state === 'invited' ? [{ seat, news: 'changed' }] : []
    return [{ seat, news: state === 'invited' ? 'invited' : was.get(seat.personId) === 'invited' ? 'removed' : 'waiting' }]
  })
  await tell(trx, work, round, await typeOf(trx, round), [...told, ...before.filter(seat => !kept.includes(seat) && seat.state === 'invited').map(seat => ({ seat, news: 'removed' as const }))])
}

/** Changes or cancels a planned session; everybody concerned is told, the next who waits gets a free seat. 409 when somebody changed it before, or it is over. */
export async function changeRound(work: Work, id: string, { version, cancel, personIds, date, time, ...changes }: RenewalRoundChanges): Promise<RenewalRoundView> {
  const current = await readRound(work, id)
  const isMoved = date !== undefined || time !== undefined || changes.siteId !== undefined || changes.place !== undefined || changes.minutes !== undefined
  const startsAt = cancel === undefined && (date !== undefined || time !== undefined || changes.siteId !== undefined) ? await requireSession(work, { siteId: changes.siteId ?? current.siteId, date: date ?? current.date, time: time ?? current.time }) : undefined
  if (personIds) await requirePeople(work, personIds, date ?? current.date)
  await work.db.transaction(async (trx) => {
    const before = await requirePlanned(trx, id)
    if (!await updateRound(trx, { id, version }, cancel === undefined ? { ...changes, ...(startsAt && { startsAt }) } : { state: 'cancelled', note: cancel })) throw new Refusal('conflict', 'changed', { message: 'Somebody changed this before you' })
    const [round] = await listRounds(trx, { id })
    if (cancel === undefined) await reseat(trx, work, round!, personIds && [...new Set(personIds)], isMoved)
    else await tell(trx, work, round!, await typeOf(trx, round!), (await listSeats(trx, [id])).map(seat => ({ seat, news: 'cancelled' as const })))
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: cancel === undefined ? 'renewal.changed' : 'renewal.cancelled', subject: { kind: 'renewal', id }, before, after: { ...changes, startsAt, personIds, cancel } })
  })
  return readRound(work, id)
}

/** Records who was there, from the session's day on. 422 before it, or for somebody without a seat. */
export async function recordAttendance(work: Work, id: string, { present, absent }: AttendanceBody): Promise<RenewalRoundView> {
  const view = await readRound(work, id)
  if (dateInZone(work.now, view.timeZone) < view.date) throw badField('present', 'the session has not come yet', 'notYetHeld')
  const seated = new Set(view.people.map(person => person.personId))
  if ([...present, ...absent].some(personId => !seated.has(personId)) || present.some(personId => absent.includes(personId))) throw badField('present', 'holds somebody without a seat, or twice')
  await work.db.transaction(async (trx) => {
    const round = await requirePlanned(trx, id).catch((error: unknown) => {
      if (view.state === 'held') return null
      throw error
    })
    for (const personId of present) await updateSeat(trx, { roundId: id, personId }, { state: 'present' })
    for (const personId of absent) await updateSeat(trx, { roundId: id, personId }, { state: 'absent' })
    if (round) await updateRound(trx, round, { state: 'held' })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'renewal.attendance', subject: { kind: 'renewal', id }, after: { present, absent } })
  })
  return readRound(work, id)
}

/**
 * Renews the cards of all who were there, in one action: verified by the safety manager who acts, with the session as
 * its proof and a file as evidence if there is one. A type with a module is only issued by passing it (409).
 */
export async function renewAll(work: Work, id: string, body: RenewalBody): Promise<RenewalRoundView> {
  const view = await readRound(work, id)
  const type = (await findCredentialType(work.db, view.type))!
  if (type.module) throw new Refusal('conflict', 'moduleOnly', { message: 'This is only issued by passing its module' })
  const issuedOn = body.issuedOn ?? view.date
  const problem = printedDateProblem(type.validity, issuedOn, body.expiresOn)
  if (problem) throw badField('expiresOn', problem === 'needed' ? 'the date printed on the card is needed' : 'does not fit this type', problem === 'needed' ? 'expiresOnNeeded' : 'expiresOnRefused')
  if (body.fileId && !await findFile(work.db, body.fileId)) throw badField('fileId', 'is not a file', 'unknownFile')
  const renewed = view.people.filter(person => person.state === 'present' && person.credentialId === null)
  if (renewed.length === 0) throw new Refusal('conflict', 'nobodyToRenew', { message: 'Nobody who was there waits for a card' })
  await work.db.transaction(async (trx) => {
    for (const { personId } of renewed) {
      const credential = {
        id: randomUUID(), personId, typeId: type.id, issuedOn, expiresOn: expiryOf(type.validity, issuedOn, body.expiresOn), number: null, issuer: body.issuer ?? view.trainer, siteId: null,
        details: { trainer: view.trainer }, fileId: body.fileId ?? null, verification: 'verified' as const, verifiedBy: work.actor.personId, verifiedAt: work.now, verificationNote: body.note ?? null, cardCode: randomCode(), createdBy: work.actor.personId, createdAt: work.now,
      }
      await insertCredential(trx, credential)
      await updateSeat(trx, { roundId: id, personId }, { credentialId: credential.id })
      const { cardCode: _secret, ...after } = credential
      await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'credential.added', subject: { kind: 'credential', id: credential.id }, after: { ...after, type: type.code, renewal: id } })
    }
  })
  return readRound(work, id)
}
