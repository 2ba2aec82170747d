import type { Language, WorkTag } from '#shared/domain/states'
import type { Weather } from '#shared/schemas/weather'
import type { Db } from './database'

/** Which words were given: the title and the content's hash in each language at the time. */
export type TalkVersions = Record<Language, { title: string, hash: string, sources?: string[] }>

export interface Briefing {
  id: string
  siteId: string
  localDate: string
  runBy: string
  talk: string
  talkVersions: TalkVersions
  work: WorkTag[]
  weather: Weather | null
  notes: string | null
  secret: Uint8Array
  openedAt: string
  closedAt: string | null
  sealedAt: string | null
  withoutSignal: boolean
  createdAt: string
}

export interface SiteRow { id: string, code: string, name: string, timeZone: string, address: string | null }

/** A briefing with its site and the name and role of who runs it. */
export interface BriefingWithSite extends Briefing { site: SiteRow, runByName: string, runByRole: string }

interface BriefingRow extends Omit<Briefing, 'talkVersions' | 'work' | 'weather' | 'withoutSignal'> { talkVersions: string, work: string, weather: string | null, withoutSignal: number }

function toBriefing(row: BriefingRow): Briefing {
  return {
    ...row,
    talkVersions: JSON.parse(row.talkVersions) as TalkVersions,
    work: JSON.parse(row.work) as WorkTag[],
    weather: row.weather === null ? null : JSON.parse(row.weather) as Weather,
    withoutSignal: row.withoutSignal === 1,
  }
}

const columns = ['id', 'siteId', 'localDate', 'runBy', 'talk', 'talkVersions', 'work', 'weather', 'notes', 'secret', 'openedAt', 'closedAt', 'sealedAt', 'withoutSignal', 'createdAt']

/** The briefing, or null. */
export async function getBriefing(db: Db, id: string): Promise<BriefingWithSite | null> {
  const row = await db('briefings').join('sites', 'sites.id', 'briefings.siteId').join('people', 'people.id', 'briefings.runBy').where({ 'briefings.id': id })
    .first(...columns.map(column => `briefings.${column}`), 'sites.code as siteCode', 'sites.name as siteName', 'sites.timeZone as siteTimeZone', 'sites.address as siteAddress', 'people.name as runByName', 'people.role as runByRole')
  if (!row) return null
  const { siteCode, siteName, siteTimeZone, siteAddress, runByName, runByRole, ...own } = row
  return { ...toBriefing(own as BriefingRow), site: { id: own.siteId, code: siteCode, name: siteName, timeZone: siteTimeZone, address: siteAddress }, runByName, runByRole }
}

/** Who opened a briefing and where, for a repeat with the same id; undefined when the id is free. */
export const getOpener = (db: Db, id: string): Promise<{ runBy: string, siteId: string } | undefined> => db('briefings').where({ id }).first('runBy', 'siteId')

/** The employer of who gives a talk, for the sheet. */
export async function getEmployer(db: Db, personId: string): Promise<string> {
  return (await db('people').where({ id: personId }).first('employer'))?.employer ?? ''
}

/** Writes a new briefing. Throws when its id is taken. */
export async function insertBriefing(db: Db, briefing: Omit<Briefing, 'closedAt' | 'sealedAt'>): Promise<void> {
  const { talkVersions, work, weather, secret, ...rest } = briefing
  await db('briefings').insert({ ...rest, secret: Buffer.from(secret), talkVersions: JSON.stringify(talkVersions), work: JSON.stringify(work), weather: weather && JSON.stringify(weather) })
}

/** Writes the end of the talk, and marks as late who signed after it. */
export async function closeBriefing(db: Db, id: string, closedAt: string): Promise<void> {
  await db('briefings').where({ id }).update({ closedAt })
  await db('signIns').where({ briefingId: id }).where('signedAt', '>', closedAt).update({ late: true })
}

/** Writes the moment of sealing. */
export async function markSealed(db: Db, id: string, sealedAt: string): Promise<void> {
  await db('briefings').where({ id }).update({ sealedAt })
}

/** Ids of briefings that are not sealed yet, oldest first, with what decides when their day ends. */
export const listUnsealed = (db: Db): Promise<{ id: string, localDate: string, timeZone: string, withoutSignal: number, createdAt: string }[]> =>
  db('briefings').join('sites', 'sites.id', 'briefings.siteId').whereNull('sealedAt').orderBy(['localDate', 'openedAt'])
    .select('briefings.id', 'localDate', 'timeZone', 'withoutSignal', 'briefings.createdAt')

/** The last day on which each talk was given before or on `date`: at the site, and anywhere. */
export async function lastDaysOfTalks(db: Db, siteId: string, date: string): Promise<{ here: Map<string, string>, company: Map<string, string> }> {
  const rows: { talk: string, siteId: string, last: string }[] = await db('briefings').where('localDate', '<=', date).groupBy('talk', 'siteId').select('talk', 'siteId').max('localDate as last')
  const here = new Map<string, string>()
  const company = new Map<string, string>()
  for (const row of rows) {
    if (row.siteId === siteId) here.set(row.talk, row.last)
    if ((company.get(row.talk) ?? '') < row.last) company.set(row.talk, row.last)
  }
  return { here, company }
}
