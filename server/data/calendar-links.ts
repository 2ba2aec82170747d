import type { CredentialFilters } from '#shared/schemas/credentials'
import type { Role } from '#shared/domain/states'
import type { Db } from './database'

/** What a calendar link was made for: `asWorker` when its maker had a worker's abilities then (a badge sign-in). */
export interface CalendarGrant { asWorker: boolean, filters: CredentialFilters }

const most = 10

/** Keeps a link for somebody's calendar; the oldest go when there are more than ten. */
export async function insertCalendarLink(db: Db, link: { tokenHash: string, personId: string, grant: CalendarGrant, now: string }): Promise<void> {
  const { tokenHash, personId, grant, now } = link
  const older = await db('links').where({ kind: 'calendar', personId }).orderBy('createdAt', 'desc').offset(most - 1).limit(100).pluck('tokenHash')
  await db('links').whereIn('tokenHash', older).delete()
  await db('links').insert({ tokenHash, kind: 'calendar', personId, filters: JSON.stringify(grant), createdBy: personId, createdAt: now })
}

/** Ends every calendar link of a person and tells how many there were. */
export async function deleteCalendarLinks(db: Db, personId: string): Promise<number> {
  return db('links').where({ kind: 'calendar', personId }).delete()
}

export interface CalendarOwner { personId: string, name: string, role: Role, language: 'en' | 'es', leftOn: string | null, grant: CalendarGrant }

/** Whose calendar a link opens, and with which filters; undefined for an unknown or ended link. */
export async function findCalendarOwner(db: Db, tokenHash: string): Promise<CalendarOwner | undefined> {
  const row = await db('links').join('people', 'people.id', 'links.personId').where({ tokenHash, kind: 'calendar' }).first('people.id', 'people.name', 'people.role', 'people.language', 'people.leftOn', 'links.filters')
  return row && { personId: row.id, name: row.name, role: row.role, language: row.language, leftOn: row.leftOn, grant: JSON.parse(row.filters) as CalendarGrant }
}
