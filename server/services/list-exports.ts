import type { AuditQuery } from '#shared/schemas/audit'
import type { BriefingListItem } from '#shared/schemas/briefing'
import type { BoardQuery, ClearanceView, MissingView } from '#shared/schemas/clearance'
import type { ExportFormat, Page } from '#shared/schemas/common'
import type { LookAheadQuery } from '#shared/schemas/look-ahead'
import type { MailQuery } from '#shared/schemas/mail'
import type { PeopleQuery } from '#shared/schemas/people'
import type { DesignationsQuery } from '#shared/schemas/requirements'
import { listStoredTypes } from '../data/credentials'
import { listDuties } from '../data/duties'
import { mapSiteNames } from '../data/views/names'
import { listWidths, listWords, type ListName } from '../documents/list-words'
import { screenWord } from '../documents/screen-words'
import { inOnePiece, type TableRow } from '../documents/table-files'
import { readAudit } from './audit'
import { listOwnBriefings } from './briefings'
import { readClearance } from './clearance'
import { readCrews } from './crews'
import { readLookAhead } from './look-ahead'
import { readMailQueue } from './mail-queue'
import { readNearMisses } from './near-misses'
import { readDesignations } from './designations'
import { readPackets } from './packets'
import { readPeople } from './people'
import { readRounds } from './renewals'
import { readRules } from './rules'
import { readSites } from './sites'
import { exportTable, pagesOf, toRows } from './table-export'
import { toListItem, type Talk } from './talks'
import type { Teaching } from './teaching'
import { readQuestions } from './trainer-questions'
import type { Work } from './work'

/** Filters of a list without its pages, and the format of the file. */
type Asked<Query> = Omit<Query, 'page' | 'perPage'> & { format: ExportFormat }
type Paging = Pick<Page<unknown>, 'page' | 'perPage'>

function write(work: Work, format: ExportFormat, name: ListName, pieces: AsyncIterable<readonly TableRow[]>) {
  const { title, fileName, columns } = listWords[work.actor.language][name]
  return exportTable(work, format, { title, fileName, columns: columns.map((column, index) => ({ title: column, width: listWidths[name][index]! })), pieces })
}
const word = (work: Work, key: string, values?: Record<string, string>) => screenWord(work.actor.language, key, values)
const moment = (instant: string | null, timeZone: string) => (instant === null ? null : new Intl.DateTimeFormat('sv-SE', { dateStyle: 'short', timeStyle: 'short', timeZone }).format(new Date(instant)))
const crewNames = async (work: Work) => new Map((await readCrews(work, { page: 1, perPage: 1_000_000 })).items.map(crew => [crew.id, crew.name]))

/** Everybody of the filtered list. */
export async function exportPeople(work: Work, { format, ...query }: Asked<PeopleQuery>) {
  const crews = await crewNames(work)
  return write(work, format, 'people', toRows(pagesOf(paging => readPeople(work, { ...query, ...paging })), person => ({ cells: [
    person.name, person.sortName, person.badge, word(work, `role.${person.role}`), person.crewId && crews.get(person.crewId), person.employer, person.trade, person.language,
    { date: person.hiredOn }, person.leftOn && { date: person.leftOn }, person.email, person.phone,
  ] })))
}

async function dutyNames(work: Work): Promise<(code: string) => string> {
  const names = new Map((await listDuties(work.db)).map(duty => [duty.code, duty.name[work.actor.language]]))
  return code => names.get(code) ?? code
}

/** Every crew with its people and usual slots. */
export async function exportCrews(work: Work, { format, ...query }: Asked<{ q?: string } & Paging>) {
  const nameOf = await dutyNames(work)
  return write(work, format, 'crews', toRows(pagesOf(paging => readCrews(work, { ...query, ...paging })), crew => ({ cells: [
    crew.name, crew.foremanName, crew.people, crew.duties.map(slot => `${nameOf(slot.duty)}: ${slot.count}`).join('; '),
  ] })))
}

/** Every site. */
export const exportSites = (work: Work, { format, ...query }: Asked<{ q?: string } & Paging>) =>
  write(work, format, 'sites', toRows(pagesOf(paging => readSites(work, { ...query, ...paging })), site => ({ cells: [site.name, site.code, site.timeZone, site.address] })))

/** Every briefing of the filtered list, each an hour-less entry of its day in a calendar. */
export const exportBriefings = (work: Work, { format, ...query }: Asked<Parameters<typeof listOwnBriefings>[1]>) =>
  write(work, format, 'briefings', toRows(pagesOf(paging => listOwnBriefings(work, { ...query, ...paging })), (briefing: BriefingListItem) => {
    const talk = briefing.talkTitle[work.actor.language]
    return {
      cells: [{ date: briefing.date }, briefing.siteName, talk, word(work, `briefing.state.${briefing.state}`), moment(briefing.openedAt, briefing.timeZone), briefing.runBy, briefing.count, briefing.late, briefing.hash],
      event: { id: `briefing-${briefing.id}`, on: briefing.date, summary: `${talk}: ${briefing.siteName}` },
    }
  }))

/** Every report with what was done about it; an anonymous one names nobody. */
export async function exportNearMisses(work: Work, { format }: { format: ExportFormat }) {
  const { items } = await readNearMisses(work)
  const { timeZone } = work.company
  return write(work, format, 'nearMisses', inOnePiece(items.map(report => ({ cells: [
    moment(report.when, timeZone), report.site, word(work, `nearMiss.kind.${report.kind}`), report.what, report.reporter, report.answer, report.answeredBy,
  ] }))))
}

/** The board of a site and date as it is narrowed on the screen: a line a person and duty. */
export async function exportBoard(work: Work, { format, crew, state, q, ...query }: Asked<BoardQuery>) {
  const { people } = await readClearance(work, query)
  const [nameOf, crews, types] = [await dutyNames(work), await crewNames(work), new Map((await listStoredTypes(work.db)).map(type => [type.code, type.name[work.actor.language]]))]
  const why = ({ why, anyOf }: MissingView) => word(work, `briefing.why.${why.kind}`, { type: types.get(why.type ?? anyOf[0] ?? '') ?? '', date: why.on ?? '' })
  const toLine = (person: ClearanceView['people'][number], duty: ClearanceView['people'][number]['duties'][number]) => ({ cells: [
    person.name, person.crewId && crews.get(person.crewId), nameOf(duty.duty), word(work, `clearance.${duty.state}`), duty.until && { date: duty.until }, duty.missing.map(why).join('; '),
  ] })
  const shown = people.filter(person => (!crew || person.crewId === crew) && (!q || person.name.toLocaleLowerCase().includes(q.toLocaleLowerCase())))
  return write(work, format, 'board', inOnePiece(shown.flatMap(person => person.duties.filter(duty => !state || duty.state === state).map(duty => toLine(person, duty)))))
}

/** Whose cards end in the coming weeks, each an entry on its last good day. */
export async function exportLookAhead(work: Work, { format, ...query }: Asked<LookAheadQuery>) {
  const { events } = await readLookAhead(work, query)
  return write(work, format, 'lookAhead', inOnePiece(events.map((event) => {
    const type = event.typeName[work.actor.language]
    return { cells: [{ date: event.date }, event.person, event.crew, type], event: { id: `credential-${event.credentialId}`, on: event.date, summary: `${type}: ${event.person}` } }
  })))
}

/** Every row of the filtered trail, without the details. */
export const exportAudit = (work: Work, { format, ...query }: Asked<AuditQuery>) =>
  write(work, format, 'audit', toRows(pagesOf(paging => readAudit(work, { ...query, ...paging })), row => ({ cells: [
    row.seq, moment(row.at, work.company.timeZone), row.actor, word(work, `audit.actions.${row.action.replaceAll('.', '_')}`), row.subject.kind, row.subject.name, row.hash,
  ] })))

/** Every message of the filtered queue, without its text. */
export const exportMail = (work: Work, { format, ...query }: Asked<MailQuery>) =>
  write(work, format, 'mail', toRows(pagesOf(paging => readMailQueue(work, { ...query, ...paging })), mail => ({ cells: [
    moment(mail.createdAt, work.company.timeZone), mail.recipient, mail.subject, word(work, `mailQueue.states.${mail.state}`), mail.tries, moment(mail.sentAt, work.company.timeZone), mail.lastError,
  ] })))

/** Every renewal session, a line a person; one entry a session in a calendar. */
export async function exportRenewals(work: Work, { format }: { format: ExportFormat }) {
  const { items } = await readRounds(work)
  return write(work, format, 'renewals', inOnePiece(items.flatMap((round) => {
    const type = round.typeName[work.actor.language]
    const cells = [type, moment(round.startsAt, round.timeZone), round.site, round.place, round.trainer, word(work, `renewals.${round.state}`)]
    const event = round.state === 'cancelled' ? undefined : { id: `renewal-${round.id}`, sequence: round.version, on: { startsAt: round.startsAt, minutes: round.minutes }, summary: type, location: `${round.place}, ${round.site}` }
    const lines = round.people.map(person => [...cells, person.name, person.crew, word(work, `renewals.state.${person.state}`), person.expiresOn && { date: person.expiresOn }])
    return (lines.length > 0 ? lines : [[...cells, null, null, null, null]]).map((line, index) => ({ cells: line, ...(index === 0 && event && { event }) }))
  })))
}

/** Every site packet and how often it was looked at. */
export const exportPackets = (work: Work, { format, ...query }: Asked<Parameters<typeof readPackets>[1]>) =>
  write(work, format, 'packets', toRows(pagesOf(paging => readPackets(work, { ...query, ...paging })), packet => ({ cells: [
    packet.site, packet.madeBy, moment(packet.madeAt, work.company.timeZone), { date: packet.endsOn }, word(work, `packets.${packet.state}`), packet.people, packet.views.length, packet.hash,
  ] })))

/** Everybody named in writing within reach. */
export async function exportDesignations(work: Work, { format, ...query }: Asked<DesignationsQuery>) {
  const sites = await mapSiteNames(work.db)
  return write(work, format, 'designations', toRows(pagesOf(paging => readDesignations(work, { ...query, ...paging })), named => ({ cells: [
    named.name, word(work, `people.designationKinds.${named.kind}`), named.subject, named.siteId && sites.get(named.siteId), named.authority, { date: named.from }, named.to && { date: named.to },
  ] })))
}

/** Every rule in words: whom it is for, and the groups of credentials it asks for. */
export async function exportRules(work: Work, { format }: { format: ExportFormat }) {
  const [nameOf, sites, types] = [await dutyNames(work), await mapSiteNames(work.db), new Map((await listStoredTypes(work.db)).map(type => [type.code, type.name[work.actor.language]]))]
  const [or, and] = work.actor.language === 'es' ? [' o ', ' y '] : [' or ', ' and ']
  return write(work, format, 'rules', toRows(pagesOf(paging => readRules(work, paging)), ({ appliesTo, groups }) => ({ cells: [
    [appliesTo.duty && nameOf(appliesTo.duty), appliesTo.site && (sites.get(appliesTo.site) ?? appliesTo.site)].filter(Boolean).join(', ') || word(work, 'requirements.everybody'),
    groups.map(group => group.map(code => types.get(code) ?? code).join(or)).join(and),
  ] })))
}

/** The questions to trainers that the actor sees, with their answers. */
export async function exportQuestions(work: Work, teaching: Teaching, { format }: { format: ExportFormat }) {
  const { items } = await readQuestions(work, teaching, work.actor.language)
  const { timeZone } = work.company
  return write(work, format, 'questions', inOnePiece(items.map(one => ({ cells: [moment(one.askedAt, timeZone), one.person, one.trainer, one.title, one.question, one.answer, one.answeredBy] }))))
}

/** Every talk of the library and the company. */
export const exportTalks = (work: Work, talks: Iterable<Talk>, { format }: { format: ExportFormat }) =>
  write(work, format, 'talks', inOnePiece([...talks].map(talk => toListItem(talk, work.actor.language)).map(talk => ({ cells: [
    talk.title, talk.minutes, talk.tags.map(tag => screenWord(work.actor.language, `briefing.tag.${tag}`)).join(', '), talk.seasons.join(', '), talk.isCompany ? '✓' : null,
  ] }))))
