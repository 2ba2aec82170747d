import { randomBytes, randomUUID } from 'node:crypto'
import { addMinutes, compareInstants, dateInZone } from '#shared/domain/dates'
import type { BriefingListItem, BriefingView, OpenBriefingBody, SignInLine } from '#shared/schemas/briefing'
import type { BriefingState } from '#shared/domain/states'
import type { Page } from '#shared/schemas/common'
import { appendAudit } from '../data/audit'
import { type Briefing, type BriefingWithSite, closeBriefing, getOpener, insertBriefing } from '../data/briefings'
import { countSignIns, getSignInOfPerson, listSignIns, type SignIn } from '../data/sign-ins'
import { listSheetsOfBriefing } from '../data/sheets'
import { getSite } from '../data/sites'
import { listBriefings } from '../data/views/briefing-list'
import { accessTo, requireBriefing, requireOwnBriefing } from './briefing-access'
import { tellBriefing } from './briefing-events'
import { badField, notFound, Refusal } from './refusal'
import { expectedPeople } from './roster'
import { type Talk, type Talks, toCheckView } from './talks'
import type { Work } from './work'

const mostMinutesBack = 72 * 60
/** A phone's clock may run this much ahead of the server's. */
const clockSlackMinutes = 5

export const stateOf = (briefing: Pick<Briefing, 'closedAt' | 'sealedAt'>): BriefingState => (briefing.sealedAt ? 'sealed' : briefing.closedAt ? 'closed' : 'open')

/**
 * A captured time in the past, for what was taken without signal. Slightly ahead counts as now; further ahead, or
 * more than 72 hours back, is refused (422).
 */
export function capturedTime(field: string, captured: string | undefined, now: string): string {
  if (captured === undefined) return now
  if (compareInstants(captured, addMinutes(now, clockSlackMinutes)) > 0) throw badField(field, 'lies in the future')
  if (compareInstants(captured, addMinutes(now, -mostMinutesBack)) < 0) throw badField(field, 'lies more than 72 hours back')
  return compareInstants(captured, now) > 0 ? now : new Date(captured).toISOString()
}

function toVersions(talk: Talk): Briefing['talkVersions'] {
  return { en: { title: talk.text.en.title, hash: talk.hash.en, sources: talk.text.en.sources }, es: { title: talk.text.es.title, hash: talk.hash.es } }
}

/** Opens a briefing. A repeat with the same id answers with the first (`isRepeat`); an id that is somebody else's is a conflict. */
export async function openBriefing(work: Work, body: OpenBriefingBody, talks: Talks): Promise<BriefingView & { isRepeat: boolean }> {
  const { db, now, actor } = work
  const site = await getSite(db, body.siteId)
  if (!site || await accessTo(work, body.siteId) !== 'run') throw notFound('site')
  const talk = talks.get(body.talk)
  if (!talk) throw badField('talk', 'no talk is called so')
  if (body.pour) throw badField('pour', 'no such pour')
  if (body.openedAt && !body.withoutSignal) throw badField('openedAt', 'only with withoutSignal')
  const openedAt = capturedTime('openedAt', body.openedAt, now)
  const id = body.id ?? randomUUID()
  const isRepeat = await db.transaction(async (trx) => {
    const known = await getOpener(trx, id)
    if (known && (known.runBy !== actor.personId || known.siteId !== body.siteId)) throw new Refusal('conflict', 'idTaken', { message: 'This id is taken', fields: { id: 'is taken' } })
    if (known) return true
    await insertBriefing(trx, {
      id, siteId: site.id, localDate: dateInZone(openedAt, site.timeZone), runBy: actor.personId, talk: talk.slug, talkVersions: toVersions(talk), work: body.work,
      weather: body.weather ?? null, notes: body.notes ?? null, secret: randomBytes(20), openedAt, withoutSignal: body.withoutSignal ?? false, createdAt: now,
    })
    await appendAudit(trx, { at: now, actorId: actor.personId, action: 'briefing.opened', subject: { kind: 'briefing', id }, after: { siteId: site.id, talk: talk.slug, openedAt } })
    return false
  })
  return { ...await viewBriefing(work, id, talks), isRepeat }
}

export function toLine(signIn: SignIn): SignInLine {
  return {
    id: signIn.id, ...(signIn.personId && { personId: signIn.personId }), ...(signIn.visitor && { visitor: signIn.visitor }), name: signIn.name, method: signIn.method,
    signedAt: signIn.signedAt, late: signIn.late, ...(signIn.reason && { reason: signIn.reason }), language: signIn.language, mark: signIn.mark.kind, withoutSignal: signIn.withoutSignal,
  }
}

function baseView(work: Work, briefing: BriefingWithSite, talks: Talks) {
  const { id, siteId, localDate, talk, talkVersions, openedAt, closedAt, sealedAt, site } = briefing
  const known = talks.get(talk)
  return {
    id, siteId, site: { id: site.id, code: site.code, name: site.name, timeZone: site.timeZone }, date: localDate, talk,
    talkTitle: { en: talkVersions.en.title, es: talkVersions.es.title }, talkHash: known?.isCompany || known?.hash.en === talkVersions.en.hash ? talkVersions.en.hash : null, check: known ? toCheckView(known.check) : null,
    state: stateOf(briefing), work: briefing.work, openedAt, closedAt, sealedAt, runBy: { id: briefing.runBy, name: briefing.runByName },
    withoutSignal: briefing.withoutSignal, markAsked: work.company.markAsked,
  }
}

async function fullView(work: Work, briefing: BriefingWithSite, talks: Talks, mayRun: boolean): Promise<BriefingView> {
  const signIns = await listSignIns(work.db, briefing.id)
  const expected = await expectedPeople(work.db, briefing.siteId, briefing.localDate)
  const signed = new Set(signIns.map(row => row.personId))
  const missing = expected.filter(person => !signed.has(person.id))
  const [sheet, ...addenda] = await listSheetsOfBriefing(work.db, briefing.id)
  return {
    ...baseView(work, briefing, talks), count: signIns.length, signIns: signIns.map(toLine), mayRun, weather: briefing.weather, notes: briefing.notes, expected: expected.length,
    missing: missing.map(person => person.id), missingPeople: missing.map(person => ({ personId: person.id, name: person.name })),
    sheet: sheet ? { hash: sheet.hash, previousHash: sheet.previousHash, number: sheet.number, addenda: addenda.length } : null,
  }
}

/** The briefing as the actor may see it: all of it within their reach, otherwise their own line and the count, otherwise 404. */
export async function viewBriefing(work: Work, id: string, talks: Talks): Promise<BriefingView> {
  const briefing = await requireBriefing(work.db, id)
  const access = await accessTo(work, briefing.siteId)
  if (access !== 'none') return fullView(work, briefing, talks, access === 'run')
  const own = await getSignInOfPerson(work.db, id, work.actor.personId)
  const isExpected = own !== null || (await expectedPeople(work.db, briefing.siteId, briefing.localDate)).some(person => person.id === work.actor.personId)
  if (!isExpected) throw notFound('briefing')
  return { ...baseView(work, briefing, talks), count: await countSignIns(work.db, id), signIns: own ? [toLine(own)] : [], mayRun: false }
}

/** Briefings of the actor's sites, the latest first. */
export async function listOwnBriefings(work: Work, filter: { site?: string, from?: string, to?: string, state?: BriefingState, page: number, perPage: number }): Promise<Page<BriefingListItem>> {
  const { siteIds } = await work.reach()
  return listBriefings(work.db, { ...filter, siteIds: siteIds === 'all' ? 'all' : [...siteIds] })
}

/** Ends the talk; a repeat changes nothing. `closedAt` may lie back as far as the opening. 409 when sealed. */
export async function closeOwnBriefing(work: Work, id: string, closedAt: string | undefined): Promise<void> {
  const briefing = await requireOwnBriefing(work, id)
  if (briefing.closedAt) return
  const at = capturedTime('closedAt', closedAt, work.now)
  if (compareInstants(at, briefing.openedAt) < 0) throw badField('closedAt', 'lies before the opening')
  await work.db.transaction(async (trx) => {
    await closeBriefing(trx, id, at)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'briefing.closed', subject: { kind: 'briefing', id }, after: { closedAt: at } })
  })
  tellBriefing(id, { kind: 'closed', data: { closedAt: at } })
}
