import type { Actor } from '../../shared/access/abilities'
import type { Db } from '../../server/data/database'
import type { Settings } from '../../server/services/settings'
import type { Work } from '../../server/services/work'
import { seedReference } from '../../seeds/reference'
import { insertCompany } from '../../server/data/company'
import { insertCredential, findCredentialType } from '../../server/data/credentials'
import { actorOf, insertTestPerson, openTestDatabase, workFor } from './work'

export const at = '2026-01-05T14:00:00.000Z'
/** Tuesday morning in Denver. */
export const tuesday = '2026-12-01T13:30:00.000Z'

/** A small company: a safety manager, an admin, a foreman with one crew, a hand in it, a hand of another crew, a site with the first crew. */
export async function openCredentialCompany(): Promise<Db> {
  const db = await openTestDatabase()
  await seedReference(db, at)
  await insertCompany(db, { name: 'Test Walls', timeZone: 'America/Denver', language: 'en', isDemo: false }, at)
  await insertTestPerson(db, { id: 'sam', name: 'Sam Safe', sortName: 'Safe, Sam', role: 'safety', email: 'sam@test.example' })
  await insertTestPerson(db, { id: 'ada', name: 'Ada Office', sortName: 'Office, Ada', role: 'admin', email: 'ada@test.example' })
  await insertTestPerson(db, { id: 'fay', name: 'Fay Lead', sortName: 'Lead, Fay', role: 'foreman', email: 'fay@test.example', language: 'es' })
  await db('crews').insert([{ id: 'north', name: 'North', foremanId: 'fay', createdAt: at }, { id: 'south', name: 'South', createdAt: at }])
  await insertTestPerson(db, { id: 'hal', name: 'Hal Hand', sortName: 'Hand, Hal', crewId: 'north', email: 'hal@test.example' })
  await insertTestPerson(db, { id: 'ines', name: 'Inés Quispe', sortName: 'Quispe, Inés', crewId: 'south' })
  await db('sites').insert({ id: 'site1', code: 'quarry', name: 'Quarry Lane', timeZone: 'America/Chicago', createdAt: at })
  await db('assignments').insert({ id: 'as1', crewId: 'north', siteId: 'site1', startsOn: '2026-11-01', createdAt: at })
  return db
}

let made = 0

interface Held { personId?: string, type?: string, issuedOn?: string, expiresOn?: string | null, verification?: 'unverified' | 'verified' | 'rejected', number?: string, issuer?: string, siteId?: string }

/** Inserts a credential, a verified first aid card of Hal's unless said; answers its id. */
export async function hold(db: Db, changes: Held = {}): Promise<string> {
  const { type = 'first-aid-cpr', ...rest } = changes
  const stored = await findCredentialType(db, type)
  const id = `held-${String(++made).padStart(4, '0')}`
  await insertCredential(db, { id, personId: 'hal', typeId: stored!.id, issuedOn: '2025-01-10', expiresOn: null, number: null, issuer: null, siteId: null, details: null, fileId: null, verification: 'verified', cardCode: `CARD${id.toUpperCase()}`, createdBy: 'sam', createdAt: at, ...rest })
  return id
}

const rolesOf = { sam: 'safety', ada: 'admin', fay: 'foreman', hal: 'worker', ines: 'worker' } as const

/** The work of one of the company's people. */
export const workOf = (db: Db, who: keyof typeof rolesOf, options: { now?: string, settings?: Settings } = {}): Promise<Work<Actor>> => workFor<Actor>(db, actorOf(who, rolesOf[who]), { now: tuesday, ...options })
