import type { Role } from '../../shared/domain/states'
import type { AnswerValue } from '../../shared/schemas/learning'
import { insertCompany } from '../../server/data/company'
import type { Db } from '../../server/data/database'
import { findOwnAttempt } from '../../server/data/attempts'
import { seedReference } from '../../seeds/reference'
import { actorOf, insertTestPerson, openTestDatabase, workFor } from './work'

const morning = '2026-12-01T13:30:00.000Z'

/** A company with a learner `nora`, a foreman `frank`, a safety manager `sara`, and the seeded types. */
export async function openLearningCompany(): Promise<Db> {
  const db = await openTestDatabase()
  await insertCompany(db, { name: 'Test Walls', timeZone: 'America/Denver', language: 'en', isDemo: false }, morning)
  await seedReference(db, morning)
  for (const [id, role] of [['nora', 'worker'], ['olek', 'worker'], ['frank', 'foreman'], ['sara', 'safety']] as const) await insertTestPerson(db, { id, role })
  return db
}

/** A work for somebody of that company, so many minutes after 6:30 on Tuesday morning in Denver. */
export const workAfter = (db: Db, personId: string, minutes = 0, role: Role = 'worker') =>
  workFor(db, actorOf(personId, role), { now: new Date(Date.parse(morning) + minutes * 60_000).toISOString() })

/** Names somebody assessor of a module, with the module's credential in date unless `expiresOn` says otherwise. */
export async function makeAssessor(db: Db, personId: string, module: string, options: { expiresOn?: string, siteId?: string, holds?: boolean } = {}): Promise<void> {
  await db('designations').insert({ id: `d-${personId}-${module}`, personId, kind: 'assessor', subject: module, siteId: options.siteId ?? null, authority: 'signs off', startsOn: '2026-01-05', createdAt: morning })
  if (options.holds === false) return
  const typeId = (await db('credentialTypes').where({ code: module }).first('id')).id
  await db('credentials').insert({ id: `c-${personId}-${module}`, personId, typeId, issuedOn: '2026-01-05', expiresOn: options.expiresOn ?? '2028-01-05', verification: 'verified', cardCode: `CARD-${personId}-${module}`, createdAt: morning })
}

/** The right answers of an attempt, read from what the server keeps. */
export async function rightAnswers(db: Db, personId: string, attemptId: string): Promise<Record<string, AnswerValue>> {
  const attempt = await findOwnAttempt(db, personId, attemptId)
  return Object.fromEntries(attempt!.served.items.map(({ item }) => [item.id, item.kind === 'number' ? { value: item.key.value, unit: item.unit } : typeof item.key === 'string' ? item.key : [...item.key]]))
}
