import { generateKeyPairSync } from 'node:crypto'
import { mkdtempSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { crewingOf } from '#shared/domain/crewing'
import { addDays } from '#shared/domain/dates'
import { changeDays, weekOf } from '#shared/domain/look-ahead'
import { listCrews } from '~~/server/data/crews'
import { openDatabase, type Db } from '~~/server/data/database'
import { openClearanceBook } from '~~/server/services/clearance'
import { readLookAhead } from '~~/server/services/look-ahead'
import { Refusal } from '~~/server/services/refusal'
import { expectedAnywhere } from '~~/server/services/roster'
import { toSettings } from '~~/server/services/settings'
import { seedDemoCompany } from '~~/seeds/demo'
import { seedReference } from '~~/seeds/reference'
import { readRealBanks } from '../../support/teaching'
import { actorOf, workFor } from '../../support/work'

const now = '2026-12-01T13:30:00.000Z'
let db: Db
beforeAll(async () => {
  const folder = mkdtempSync(join(tmpdir(), 'pourwright-look-ahead-'))
  db = await openDatabase(join(folder, 'demo.sqlite'))
  await seedReference(db, now)
  const key = generateKeyPairSync('ed25519').privateKey.export({ type: 'pkcs8', format: 'pem' }) as string
  await seedDemoCompany(db, toSettings({ databasePath: join(folder, 'demo.sqlite'), filesPath: '', signingKeyPath: '', signingKey: key, clock: now, demo: 'true', origin: '', tls: '', smtpUrl: '', mailFrom: '', setupToken: '' }), readRealBanks())
}, 60_000)
afterAll(() => db.destroy())

const safety = async () => workFor(db, actorOf((await db('people').where({ role: 'safety' }).first('id')).id, 'safety'), { now })

describe('the look-ahead', () => {
  it('finds the same first short day of each crew as a computation day by day', { timeout: 120_000 }, async () => {
    const work = await safety()
    const { crews } = await readLookAhead(work, { weeks: 26 })
    expect(crews.length).toBeGreaterThan(3)
    const usual = new Map((await listCrews(db, work.today)).map(crew => [crew.id, crew.duties]))
    const firstShort = new Map<string, string>()
    for (let day = work.today; day <= addDays(work.today, 26 * 7); day = addDays(day, 1)) {
      const roster = await expectedAnywhere(db, day)
      const book = await openClearanceBook(db, { whom: roster.map(person => person.id), date: day })
      for (const { crewId, siteId } of crews) {
        const key = `${crewId} ${siteId}`
        const people = roster.filter(person => person.crewId === crewId && person.siteId === siteId).map(person => person.id)
        if (firstShort.has(key) || people.length === 0) continue
        const slots = usual.get(crewId)!
        const pairs = people.flatMap(personId => slots.map(({ duty }) => ({ personId, duty, state: book.ask(personId, duty, siteId).state, fix: null })))
        if (crewingOf({ slots, personIds: people, pairs }).short.length > 0) firstShort.set(key, day)
      }
    }
    expect(crews.map(crew => [crew.crewId, crew.siteId, crew.firstShortOn])).toEqual(crews.map(crew => [crew.crewId, crew.siteId, firstShort.get(`${crew.crewId} ${crew.siteId}`) ?? null]))
    expect(crews.some(crew => crew.firstShortOn !== null)).toBe(true)
  })

  it('lists whose cards end, in order, within the weeks asked for', async () => {
    const { events, from, to, weeks } = await readLookAhead(await safety(), { weeks: 8 })
    expect(events.length).toBeGreaterThan(5)
    expect(events.map(event => event.date)).toEqual(events.map(event => event.date).sort())
    expect(events.every(event => event.date >= from && event.date <= to)).toBe(true)
    expect(weeks.flatMap(week => week.types).reduce((sum, one) => sum + one.count, 0)).toBe(events.length)
  })

  it('is not there for a site out of reach', async () => {
    await expect(readLookAhead(await safety(), { weeks: 4, site: 'nowhere' })).rejects.toThrow(Refusal)
  })
})

describe('the days on which clearance can change', () => {
  it('are the day after an expiry, starts, ends of holds, and the first day', () => {
    expect(changeDays([{ credentials: [{ issuedOn: '2026-12-10', expiresOn: '2028-02-28' }, { issuedOn: '2026-01-01', expiresOn: '2026-12-31' }], holds: [{ from: '2026-12-05', to: '2026-12-06' }], lastDays: ['2026-12-20'], hiredOn: '2026-01-01', leftOn: '2027-01-15' }], '2026-12-01', '2027-02-01'))
      .toEqual(['2026-12-01', '2026-12-05', '2026-12-07', '2026-12-10', '2026-12-21', '2027-01-01', '2027-01-15'])
  })
  it('stand in weeks that begin on Monday, over a leap day too', () => {
    expect(weekOf('2028-02-29')).toBe('2028-02-28')
    expect(weekOf('2026-12-06')).toBe('2026-11-30')
  })
})
