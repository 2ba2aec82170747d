import { mkdtempSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Actor } from '../../shared/access/abilities'
import { dateInZone } from '../../shared/domain/dates'
import type { Role } from '../../shared/domain/states'
import { getCompany } from '../../server/data/company'
import { openDatabase, type Db } from '../../server/data/database'
import { loadReach, type Reach } from '../../server/data/reach'
import { toSettings, type Settings } from '../../server/services/settings'
import type { Work } from '../../server/services/work'

/** A migrated SQLite file of its own. */
export const openTestDatabase = (): Promise<Db> => openDatabase(join(mkdtempSync(join(tmpdir(), 'pourwright-db-')), 'test.sqlite'))

export const testSettings = (raw: Record<string, unknown> = {}): Settings => toSettings({ databasePath: '', filesPath: '', signingKeyPath: '', signingKey: '', clock: '', demo: '', origin: 'https://pourwright.test', tls: '', smtpUrl: '', textUrl: '', mailFrom: 'Pourwright <pourwright@localhost>', setupToken: '', ...raw })

/** What a service is given, without a server: `now` is a Tuesday morning in Denver unless said. */
export async function workFor<Who extends Actor | null>(db: Db, actor: Who, options: { now?: string, settings?: Settings } = {}): Promise<Work<Who>> {
  const now = options.now ?? '2026-12-01T13:30:00.000Z'
  const company = await getCompany(db)
  const today = dateInZone(now, company.timeZone)
  const nothing: Reach = { siteIds: new Set<string>(), crewIds: new Set<string>() }
  return { db, actor, now, today, company, settings: options.settings ?? testSettings(), reach: () => (actor ? loadReach(db, actor, today) : Promise.resolve(nothing)) }
}

/** Inserts a person; their badge is their id unless said. */
export async function insertTestPerson(db: Db, person: { id: string, role?: Role } & Record<string, unknown>): Promise<void> {
  const at = '2026-01-05T14:00:00.000Z'
  await db('people').insert({ name: `Person ${person.id}`, sortName: person.id, badge: person.id, role: 'worker', language: 'en', employer: 'Test Walls', employerKind: 'own', hiredOn: '2026-01-05', createdAt: at, updatedAt: at, ...person })
}

/** The actor for somebody of that role. */
export const actorOf = (personId: string, role: Role, via: 'password' | 'badge' = 'password'): Actor => ({ personId, name: `Person ${personId}`, role, givenRole: role, language: 'en', via })
