import { mkdtempSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { performance } from 'node:perf_hooks'
import { Writable } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import { setTimeout as wait } from 'node:timers/promises'
import BetterSqlite from 'better-sqlite3'
import { stringify } from 'csv-stringify'
import { addDays } from '../../shared/domain/dates'
import { insertCompany } from '../../server/data/company'
import { openDatabase, type Db } from '../../server/data/database'
import { readClearance } from '../../server/services/clearance'
import { exportCredentials } from '../../server/services/credential-export'
import { readLookAhead } from '../../server/services/look-ahead'
import { queueReminders } from '../../server/services/reminders'
import { seedReference } from '../../seeds/reference'
import { randomFrom } from '../support/random'
import { actorOf, testSettings, workFor } from '../support/work'

/*
 * Clearance, look-ahead, export and reminders on seeded companies of growing size, each with 15 duties, 15 credentials a
 * person and a site for 250 people:
 *   npm run bench:company            (1,000, 3,000 and 10,000 people; BENCH_PEOPLE=500,1000 for others)
 */

const today = '2026-12-01'
const now = `${today}T13:30:00.000Z`
const perPerson = 15
const crewSize = 10

async function seedCompany(db: Db, count: number): Promise<void> {
  const random = randomFrom(count)
  await insertCompany(db, { name: 'Bench Walls', timeZone: 'America/Denver', language: 'en', isDemo: false }, now)
  await seedReference(db, now)
  const types: { id: string, validityKind: string, months: number | null, perSite: number }[] = await db('credentialTypes').select('id', 'validityKind', 'months', 'perSite')
  for (let extra = 0; extra < 6; extra += 1) {
    await db('duties').insert({ id: `duty-${extra}`, code: `extra-duty-${extra}`, nameEn: `Extra ${extra}`, nameEs: `Extra ${extra}`, learningBeside: true, sameDayFix: true, position: 20 + extra, createdAt: now })
    await db('rules').insert({ id: `rule-${extra}`, dutyId: `duty-${extra}`, createdAt: now })
    await db('ruleTypes').insert([0, 1].map(group => ({ ruleId: `rule-${extra}`, groupNumber: group, typeId: types[(extra * 2 + group) % types.length]!.id })))
  }
  const duties: string[] = await db('duties').orderBy('position').pluck('id')
  const siteCount = Math.max(4, Math.round(count / 250))
  const crewCount = Math.ceil(count / crewSize)
  const insert = async (table: string, rows: Record<string, unknown>[]) => {
    for (let start = 0; start < rows.length; start += 400) await db(table).insert(rows.slice(start, start + 400))
  }
  await insert('people', [{ id: 'sara', name: 'Sara Safety', sortName: 'Safety, Sara', badge: 'sara', role: 'safety', language: 'en', employer: 'Bench Walls', employerKind: 'own', hiredOn: '2020-01-06', email: 'sara@bench.example', createdAt: now, updatedAt: now }])
  await insert('sites', Array.from({ length: siteCount }, (_, index) => ({ id: `site-${index}`, code: `site-${index}`, name: `Site ${index}`, timeZone: 'America/Denver', createdAt: now })))
  await insert('crews', Array.from({ length: crewCount }, (_, index) => ({ id: `crew-${index}`, name: `Crew ${index}`, createdAt: now })))
  await insert('crewDuties', Array.from({ length: crewCount }, (_, index) => [0, 1, 2].map(offset => ({ crewId: `crew-${index}`, dutyId: duties[(index + offset * 5) % duties.length], count: 1 + random(2) }))).flat())
  await insert('assignments', Array.from({ length: crewCount }, (_, index) => ({ id: `assignment-${index}`, crewId: `crew-${index}`, siteId: `site-${index % siteCount}`, startsOn: '2026-06-01', createdAt: now })))
  const people = Array.from({ length: count }, (_, index) => `person-${index}`)
  await insert('people', people.map((id, index) => ({
    id, name: `Person ${index}`, sortName: `Person ${index}`, badge: `B${index}`, role: index % crewSize === 0 ? 'foreman' : 'worker', language: random(2) ? 'es' : 'en', employer: 'Bench Walls', employerKind: 'own',
    hiredOn: addDays('2022-01-03', random(1500)), email: `p${index}@bench.example`, crewId: `crew-${Math.floor(index / crewSize)}`, createdAt: now, updatedAt: now,
  })))
  await db('crews').update({ foremanId: db.raw('(select min(p.id) from people p where p.crew_id = crews.id and p.role = \'foreman\')') })
  await insert('credentials', people.flatMap((personId, index) => Array.from({ length: perPerson }, (_, number) => {
    const type = types[(index + number) % types.length]!
    const issuedOn = addDays('2025-01-01', random(690))
    const isPeriod = type.validityKind !== 'never'
    return {
      id: `credential-${index}-${number}`, personId, typeId: type.id, issuedOn, expiresOn: isPeriod ? addDays(issuedOn, 365 + random(400)) : null, number: `N${random(100_000)}`, issuer: 'County class',
      siteId: type.perSite ? `site-${Math.floor(index / crewSize) % siteCount}` : null, verification: random(40) ? 'verified' : 'unverified', cardCode: `CODE${index}X${number}`, createdAt: now,
    }
  })))
  await insert('dutyDays', people.flatMap((personId, index) => duties.slice(0, 4).map(dutyId => ({ personId, dutyId, doneOn: addDays(today, -random(150)), siteId: `site-${index % siteCount}` }))))
  await db.raw('analyze')
}

/** Milliseconds of the middle of several runs, after one that is thrown away. */
async function medianOf(run: () => Promise<unknown>, times = 5): Promise<number> {
  await run()
  const taken: number[] = []
  for (let count = 0; count < times; count += 1) {
    const start = performance.now()
    await run()
    taken.push(performance.now() - start)
  }
  return taken.sort((one, other) => one - other)[Math.floor(times / 2)]!
}

/** Writes into nothing and watches the most memory held on the way, in MB above the start. */
async function drain(stream: NodeJS.ReadableStream): Promise<{ bytes: number, peak: number }> {
  global.gc?.()
  const start = process.memoryUsage.rss()
  let [bytes, peak, chunks] = [0, start, 0]
  await pipeline(stream, new Writable({ write(chunk: Buffer, _encoding, done) {
    bytes += chunk.length
    if (++chunks % 50 === 0) peak = Math.max(peak, process.memoryUsage.rss())
    done()
  } }))
  return { bytes, peak: (peak - start) / 1024 / 1024 }
}

/** The same columns by one plain scan in SQL, written by csv-stringify alone: nothing computed, one prepared statement. */
function plainScan(path: string) {
  const file = new BetterSqlite(path, { readonly: true })
  const rows = file.prepare('select p.name, p.badge, p.employer, w.name, t.name_en, c.number, c.issuer, c.issued_on, c.expires_on, julianday(c.expires_on) - julianday(?), c.verification from credentials c join people p on p.id = c.person_id join credential_types t on t.id = c.type_id left join crews w on w.id = p.crew_id order by p.sort_name collate nocase').raw().iterate(today)
  const writer = stringify({ bom: true, record_delimiter: 'windows' })
  void (async () => {
    for (const row of rows) if (!writer.write(row)) await new Promise<void>(done => writer.once('drain', done))
    writer.end()
    file.close()
  })()
  return writer
}

interface Figures { people: number, credentials: number, board: number, lookAhead: number, export: number, scan: number, reminders: number, exportPeak: number }

async function measureCompany(people: number): Promise<Figures> {
  const path = join(mkdtempSync(join(tmpdir(), 'bench-company-')), 'bench.sqlite')
  const db = await openDatabase(path)
  await seedCompany(db, people)
  const work = await workFor(db, actorOf('sara', 'safety'), { now })
  const board = await medianOf(() => readClearance(work, { site: 'site-1', date: today }))
  const onBoard = (await readClearance(work, { site: 'site-1', date: today })).people.length
  const lookAhead = await medianOf(() => readLookAhead(work, { weeks: 26 }), 3)
  let exportPeak = 0
  const exported = await medianOf(async () => {
    const { body } = await exportCredentials(work, 'csv', { sort: 'person' })
    exportPeak = Math.max(exportPeak, (await drain(body as NodeJS.ReadableStream)).peak)
  }, 3)
  const scan = await medianOf(() => drain(plainScan(path)), 3)
  const settings = { ...testSettings(), clock: { now: () => now, isSet: true } }
  const start = performance.now()
  const digests = await queueReminders(db, settings)
  const reminders = performance.now() - start
  console.log(`${String(people).padStart(6)} people, ${people * perPerson} credentials, ${(statSync(path).size / 1024 / 1024).toFixed(0)} MB: board of a site of ${onBoard} ${board.toFixed(0)} ms; look-ahead of 26 weeks ${lookAhead.toFixed(0)} ms; CSV ${exported.toFixed(0)} ms (plain scan ${scan.toFixed(0)} ms: ${(scan / exported).toFixed(2)} of its speed), at most ${exportPeak.toFixed(0)} MB more memory; reminders ${reminders.toFixed(0)} ms for ${digests} digests`)
  await db.destroy()
  return { people, credentials: people * perPerson, board, lookAhead, export: exported, scan, reminders, exportPeak }
}

const sizes = (process.env.BENCH_PEOPLE ?? '1000,3000,10000').split(',').map(Number)
const figures: Figures[] = []
for (const size of sizes) {
  figures.push(await measureCompany(size))
  await wait(200)
}
for (const [index, after] of figures.entries()) {
  const before = figures[index - 1]
  if (!before) continue
  const growth = (name: 'board' | 'lookAhead' | 'export' | 'reminders') => `${name} ${(after[name] / before[name]).toFixed(2)}`
  console.log(`${before.people} to ${after.people} people (${(after.people / before.people).toFixed(2)} times): ${(['board', 'lookAhead', 'export', 'reminders'] as const).map(growth).join(', ')} times the time`)
}
