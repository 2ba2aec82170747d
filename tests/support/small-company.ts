import { mkdtempSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { openDatabase, type Db } from '~~/server/data/database'
import { hashSecret } from '~~/server/services/passwords'
import { seedReference } from '~~/seeds/reference'
import { createClient, type Client } from './client'
import { startServer, type RunningServer } from './server'

const password = 'four courses before noon'
const pin = '730294'
const start = '2026-01-05'

interface PersonSeed { id: string, name: string, role?: string, language?: string, crewId?: string, badge: string, leftOn?: string }
const people: PersonSeed[] = [
  { id: 'foreman', name: 'Ines Toledo', role: 'foreman', crewId: 'crew-a', badge: '100' },
  { id: 'hand-a', name: 'Wren Abbott', crewId: 'crew-a', badge: '101' },
  { id: 'hand-b', name: 'Lupe Ferrer', language: 'es', crewId: 'crew-a', badge: '102' },
  { id: 'hand-c', name: 'Odd Nilsen', crewId: 'crew-a', badge: '103' },
  { id: 'other-foreman', name: 'Pell Okafor', role: 'foreman', crewId: 'crew-b', badge: '200' },
  { id: 'other-hand', name: 'Sid Marsh', crewId: 'crew-b', badge: '201' },
  { id: 'super', name: 'Gil Prado', role: 'superintendent', badge: '300' },
  { id: 'safety', name: 'Mae Lindqvist', role: 'safety', badge: '301' },
  { id: 'office', name: 'Bo Hartley', role: 'admin', badge: '302' },
  { id: 'gone', name: 'Ray Quill', badge: '900', leftOn: '2026-10-01' },
]

async function fill(db: Db): Promise<void> {
  const now = '2026-01-01T12:00:00Z'
  const [passwordHash, pinHash] = await Promise.all([hashSecret(password), hashSecret(pin)])
  await seedReference(db, now)
  await db('company').insert({ id: 1, name: 'Slate Hollow Forms', timeZone: 'America/Denver', createdAt: now })
  for (const [id, name] of [['crew-a', 'North crew'], ['crew-b', 'South crew']]) await db('crews').insert({ id, name, createdAt: now })
  for (const { id, name, role = 'worker', language = 'en', crewId = null, badge, leftOn = null } of people) {
    await db('people').insert({ id, name, sortName: name, badge, email: `${id}@slatehollow.example`, role, language, employer: 'Slate Hollow Forms', trade: role === 'worker' ? 'installer' : null, hiredOn: start, leftOn, crewId, createdAt: now, updatedAt: now })
    await db('signInSecrets').insert({ personId: id, passwordHash, pinHash, setAt: now })
  }
  await db('crews').where({ id: 'crew-a' }).update({ foremanId: 'foreman' })
  await db('crews').where({ id: 'crew-b' }).update({ foremanId: 'other-foreman' })
  await db('sites').insert({ id: 'site-a', code: 'QUARRY', name: 'Quarry Lane', timeZone: 'America/Denver', address: '12 Quarry Lane, Elder Gap', superintendentId: 'super', position: 0, createdAt: now })
  await db('sites').insert({ id: 'site-b', code: 'MILL', name: 'Mill Street', timeZone: 'America/Chicago', position: 1, createdAt: now })
  await db('assignments').insert({ id: 'as-a', crewId: 'crew-a', siteId: 'site-a', startsOn: start, createdAt: now })
  await db('assignments').insert({ id: 'as-b', crewId: 'crew-b', siteId: 'site-b', startsOn: start, createdAt: now })
  const stacker = await db('duties').where({ code: 'stacker' }).first('id')
  await db('crewDuties').insert({ crewId: 'crew-a', dutyId: stacker.id, count: 2 })
}

export interface SmallCompany {
  server: RunningServer
  /** The test's own look at the database; use it between requests only. */
  db: Db
  as: (id: string) => Promise<Client>
  visitor: () => Client
  /** Starts the server again on the same data, for example at another instant. */
  restart: (clock: string, env?: Record<string, string>) => Promise<void>
  stop: () => Promise<void>
}

export const smallCompanySecrets = { password, pin }

/** A built server over a small company of its own: two sites, two crews, one of each role; Tuesday 6:30 in Denver. */
export async function startSmallCompany(clock = '2026-12-01T13:30:00Z', env: Record<string, string> = {}): Promise<SmallCompany> {
  const folder = mkdtempSync(join(tmpdir(), 'pourwright-small-'))
  const db = await openDatabase(join(folder, 'pourwright.sqlite'))
  await fill(db)
  let server = await startServer({ folder, env: { NUXT_CLOCK: clock, ...env } })
  return {
    get server() { return server },
    db,
    async as(id) {
      const client = createClient(server.origin)
      const answer = await client.post('/api/session', { email: `${id}@slatehollow.example`, password })
      if (answer.status !== 200) throw new Error(`sign-in as ${id} answered ${answer.status}: ${answer.text}`)
      return client
    },
    visitor: () => createClient(server.origin),
    async restart(nextClock, nextEnv = env) {
      await server.stop()
      server = await startServer({ folder, env: { NUXT_CLOCK: nextClock, ...nextEnv } })
    },
    async stop() {
      await server.stop()
      await db.destroy()
    },
  }
}
