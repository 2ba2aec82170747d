import { generateKeyPairSync } from 'node:crypto'
import { readdirSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { parse } from 'yaml'
import { crewingOf } from '#shared/domain/crewing'
import { addDays, addMonths, dateInZone, daysBetween } from '#shared/domain/dates'
import { firstBrokenLink, hashInput } from '#shared/domain/sheet'
import { seedDemoCompany } from '~~/seeds/demo'
import { taughtModules } from '~~/seeds/demo/learning-content'
import { demoTalks } from '~~/seeds/demo/talks'
import { seedReference } from '~~/seeds/reference'
import { checkAuditChain } from '~~/server/data/audit'
import { type Db, openDatabase } from '~~/server/data/database'
import { openClearanceBook } from '~~/server/services/clearance'
import { expectedPeople } from '~~/server/services/roster'
import { isRightSecret } from '~~/server/services/passwords'
import { sha256 } from '~~/server/services/hashing'
import { toSettings } from '~~/server/services/settings'
import { checkSignature, loadSigningKey } from '~~/server/services/signing-key'
import { toBank } from '~~/server/services/teaching'
import { loadEffective } from '../support/demo-credentials'

const signingKey = String(generateKeyPairSync('ed25519').privateKey.export({ type: 'pkcs8', format: 'pem' }))
const settingsAt = (clock: string) => toSettings({ databasePath: ':memory:', clock, demo: true, filesPath: '', signingKeyPath: '', signingKey, origin: '', tls: false, smtpUrl: '', mailFrom: '', setupToken: '' })
const readText = (path: string) => readFileSync(resolve(import.meta.dirname, '../..', path), 'utf8')
const frontMatter = (path: string) => parse(readText(path).split('---')[1] ?? '')
const banks = ['stacking', 'running-bond'].map(slug => toBank(parse(readText(`server/assets/quizzes/${slug}.yaml`))))

async function seededAt(clock: string): Promise<Db> {
  const settings = settingsAt(clock)
  const db = await openDatabase(':memory:')
  await seedReference(db, settings.clock.now())
  await seedDemoCompany(db, settings, banks)
  return db
}

// A Tuesday morning, the last minute of a year in Denver, a leap day, three days after one, and a Saturday that is Friday in Denver.
const clocks = ['2026-12-01T13:30:00Z', '2027-01-01T06:59:59Z', '2028-02-29T15:00:00Z', '2028-03-03T15:00:00Z', '2026-08-15T03:00:00Z']

describe.each(clocks)('the demo company at %s', (clock) => {
  let db: Db
  const today = dateInZone(clock, 'America/Denver')
  beforeAll(async () => {
    db = await seededAt(clock)
  }, 30_000)
  afterAll(() => db.destroy())

  it('has 4 sites in two zones, 6 crews and about 60 people', async () => {
    expect(await db('sites').orderBy('position').pluck('timeZone')).toEqual(['America/Denver', 'America/Denver', 'America/Chicago', 'America/Chicago'])
    expect(await db('crews').pluck('id')).toHaveLength(6)
    const people = await db('people').select('leftOn', 'hiredOn')
    expect(people.length).toBeGreaterThanOrEqual(55)
    expect(people.length).toBeLessThanOrEqual(65)
  })

  it('has foreman, installer and new hire at the first site today', async () => {
    const first = await db('sites').orderBy('position').first('id')
    const there = await db('people').join('assignments', 'assignments.crewId', 'people.crewId')
      .where({ siteId: first.id }).where('startsOn', '<=', today).where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', today)).pluck('badge')
    expect(there).toEqual(expect.arrayContaining(['1011', '1037', '2041']))
  })

  it('rosters nobody at two sites on one day', async () => {
    const stays = await db('assignments').select('crewId', 'personId', 'startsOn', 'endsOn')
    for (const [index, stay] of stays.entries()) {
      const clash = stays.slice(index + 1).find(other => other.crewId === stay.crewId && other.personId === stay.personId
        && other.startsOn <= (stay.endsOn ?? '9999') && stay.startsOn <= (other.endsOn ?? '9999'))
      expect(clash).toBeUndefined()
    }
  })

  it('has 20 to 25 credentials due within 60 days and about 6 expired', async () => {
    const effective = await loadEffective(db, today)
    const count = (state: string) => effective.filter(one => one.state === state).length
    expect(count('dueSoon')).toBeGreaterThanOrEqual(20)
    expect(count('dueSoon')).toBeLessThanOrEqual(25)
    expect(count('expired')).toBe(6)
    expect(count('unverified')).toBe(4)
    expect(count('withdrawn')).toBe(1)
    expect(count('rejected')).toBe(1)
    expect(count('notYet')).toBe(1)
  })

  it('dates nothing before the hire and nothing but the booked class after today', async () => {
    const rows = await db('credentials').join('people', 'people.id', 'credentials.personId').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId')
      .select('credentialTypes.code', 'issuedOn', 'hiredOn', 'people.name', 'credentials.createdAt')
    const early = rows.filter(row => row.issuedOn < row.hiredOn && !['first-aid-cpr', 'outreach-card', 'fall-protection'].includes(row.code))
    expect(early).toEqual([])
    expect(rows.filter(row => row.issuedOn > today).map(row => row.code)).toEqual(['scaffold-erector'])
    expect(rows.filter(row => row.createdAt > clock)).toEqual([])
  })

  it('gives every current worker hazard communication and the orientation of their site', async () => {
    const workers = await db('people').join('assignments', query => query.on('assignments.crewId', 'people.crewId').orOn('assignments.personId', 'people.id'))
      .where('hiredOn', '<=', today).whereNull('leftOn').where('startsOn', '<=', today).where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', today))
      .select('people.id', 'people.name', 'assignments.siteId')
    expect(workers.length).toBeGreaterThan(45)
    const held = await db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId').select('personId', 'code', 'siteId')
    const without = workers.filter(worker => !held.some(one => one.personId === worker.id && one.code === 'hazard-communication')
      || !held.some(one => one.personId === worker.id && one.code === 'site-orientation' && one.siteId === worker.siteId))
    expect(without).toEqual([])
  })

  it('lets the new hire hold hazard communication, the orientation and the two lowest courses only', async () => {
    const codes = await db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId')
      .join('people', 'people.id', 'credentials.personId').where({ badge: '2041' }).pluck('code')
    expect(codes.sort()).toEqual(['footings-and-layout', 'hazard-communication', 'ready-for-site', 'site-orientation', 'tools-and-cutting', 'what-the-wall-is-made-of', 'working-at-height'])
  })

  it('lets somebody\'s pump and hose run out three days ago, so that the pour crew is short', async () => {
    const effective = await loadEffective(db, today)
    const crew = await db('crews').where({ name: 'Pour crew' }).first('id')
    const members = new Set(await db('people').where({ crewId: crew.id }).pluck('id'))
    const hose = effective.filter(one => one.type === 'pump-and-hose' && members.has(one.personId))
    const expired = hose.filter(one => one.state === 'expired')
    expect(expired).toHaveLength(1)
    // A yearly interval can't end on 29 February of a leap year: it ends the day before.
    expect([addDays(today, -3), addMonths(addMonths(addDays(today, -3), -12), 12)]).toContain(expired[0]?.expiresOn)
    expect(hose.filter(one => one.state === 'inDate' || one.state === 'dueSoon')).toHaveLength(1)
  })

  it('can crew every crew\'s usual work today but the pour crew\'s, which is one short at hose and spotter', async () => {
    const short: Record<string, { duties: string[], missing: number }> = {}
    for (const crew of await db('crews').select('id', 'name')) {
      const slots = await db('crewDuties').join('duties', 'duties.id', 'crewDuties.dutyId').where({ crewId: crew.id }).select('code as duty', 'count')
      const stay = await db('assignments').where({ crewId: crew.id }).where('startsOn', '<=', today).where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', today)).first('siteId')
      const personIds = (await expectedPeople(db, stay.siteId, today)).filter(person => person.crewId === crew.id).map(person => person.id)
      const book = await openClearanceBook(db, { whom: 'all', date: today })
      const pairs = personIds.flatMap(personId => slots.map(({ duty }) => ({ personId, duty, state: book.ask(personId, duty, stay.siteId).state, fix: null })))
      const { short: empty, because } = crewingOf({ slots, personIds, pairs })
      if (empty.length > 0) short[crew.name] = { duties: because!.duties.sort(), missing: empty.reduce((sum, slot) => sum + slot.count, 0) }
    }
    expect(short).toEqual({ 'Pour crew': { duties: ['hose-hand', 'pump-spotter'], missing: 1 } })
  })

  it('asks everybody for hazard communication and each site for its orientation', async () => {
    const rules = await db('rules').join('ruleTypes', 'ruleTypes.ruleId', 'rules.id').join('credentialTypes', 'credentialTypes.id', 'ruleTypes.typeId')
      .whereNull('dutyId').select('siteId', 'code')
    expect(rules.filter(rule => rule.siteId === null).map(rule => rule.code)).toEqual(['hazard-communication'])
    expect(rules.filter(rule => rule.siteId !== null).map(rule => rule.code)).toEqual(Array(4).fill('site-orientation'))
  })

  it('seals every past morning in its site\'s chain, signed, and leaves none open', async () => {
    const key = loadSigningKey(settingsAt(clock))
    for (const site of await db('sites').pluck('id')) {
      const sheets = await db('sheets').where({ siteId: site }).orderBy('number')
      const chain = sheets.map(sheet => ({ hash: sheet.hash, previousHash: sheet.previousHash, sheet: JSON.parse(sheet.body) }))
      expect(chain.length).toBeGreaterThan(30)
      expect(firstBrokenLink(chain, sha256)).toBeNull()
      expect(sheets.map(sheet => sheet.number)).toEqual(sheets.map((_, index) => index + 1))
      expect(chain.every((link, index) => checkSignature(key, hashInput(link), sheets[index]) === 'valid')).toBe(true)
    }
    expect(await db('briefings').whereNull('sealedAt').pluck('id')).toEqual([])
    const last = (await db('briefings').max('localDate as last').first())?.last
    expect(last < today).toBe(true)
    expect(daysBetween(last, today)).toBeLessThanOrEqual(4)
  })

  it('has a quiz passed and a hands-on signed by somebody else behind every card of a taught module', async () => {
    const cards = await db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId').whereIn('code', taughtModules.map(module => module.slug))
      .leftJoin('attempts', 'attempts.id', 'credentials.attemptId').leftJoin('signOffs', 'signOffs.id', 'credentials.signOffId')
      .select('credentials.personId', 'credentials.issuedOn', 'attempts.passed as quiz', 'signOffs.passed as handsOn', 'assessorId', 'signedAt', 'submittedAt')
    expect(cards.length).toBeGreaterThan(30)
    const unproved = cards.filter(card => card.quiz !== 1 || card.handsOn !== 1 || card.assessorId === card.personId || card.submittedAt > card.signedAt)
    expect(unproved).toEqual([])
    expect(cards.filter(card => dateInZone(card.signedAt, 'America/Denver') !== card.issuedOn)).toEqual([])
  })

  it('keeps the audit chain whole and in order', async () => {
    const checked = await checkAuditChain(db)
    expect(checked).toMatchObject({ intact: true })
    expect(checked.rows).toBeGreaterThan(500)
    const times = await db('audit').orderBy('seq').pluck('at')
    expect(times.filter(at => at > clock.replace('Z', '.999Z'))).toEqual([])
    expect([...times].sort()).toEqual(times)
  })
})

describe('the demo sign-ins', () => {
  let db: Db
  beforeAll(async () => {
    db = await seededAt(clocks[0]!)
  }, 30_000)
  afterAll(() => db.destroy())

  it.each(['safety', 'office', 'foreman', 'super', 'installer'])('lets %s in by the password, in English', async (mailbox) => {
    const row = await db('people').join('signInSecrets', 'signInSecrets.personId', 'people.id').where({ email: `${mailbox}@cedarhollow.example` }).first()
    expect(row.language).toBe('en')
    expect(await isRightSecret(row.passwordHash, 'running-bond')).toBe(true)
  })

  it('lets the new hire in by badge and PIN, in Spanish', async () => {
    const row = await db('people').join('signInSecrets', 'signInSecrets.personId', 'people.id').where({ badge: '2041' }).first()
    expect(row.language).toBe('es')
    expect(await isRightSecret(row.pinHash, '739416')).toBe(true)
  })

  it('gives everybody invented mail and phone, a badge of their own and a sort name', async () => {
    const people = await db('people').select('email', 'phone', 'badge', 'sortName')
    expect(people.every(one => one.email === null || one.email.endsWith('.example'))).toBe(true)
    expect(people.every(one => /555-01\d\d$/.test(one.phone))).toBe(true)
    expect(new Set(people.map(one => one.phone)).size).toBe(people.length)
    expect(people.every(one => /^[^,]+, [^,]+$/.test(one.sortName))).toBe(true)
  })

  it('leaves a database with people as it was', async () => {
    const before = await db('audit').count({ rows: '*' }).first()
    await seedDemoCompany(db, settingsAt(clocks[0]!), banks)
    expect(await db('audit').count({ rows: '*' }).first()).toEqual(before)
  })

  it('tells the same story at every seeding', { timeout: 30_000 }, async () => {
    const again = await seededAt(clocks[0]!)
    const story = (one: Db) => one('credentials').orderBy('id').select('id', 'personId', 'issuedOn', 'expiresOn', 'number', 'details')
    expect(await story(again)).toEqual(await story(db))
    await again.destroy()
  })
})

describe('what the demo tells of the content', () => {
  it.each(taughtModules.map(module => [module.slug, module] as const))('names the lessons and steps of %s as the content has them', (slug, module) => {
    const files = readdirSync(resolve(import.meta.dirname, `../../content/en/modules/${slug}`)).filter(name => name !== 'index.md').sort()
    expect(files.map(name => name.replace(/^\d+\.|\.md$/g, ''))).toEqual(module.lessons)
    expect(files.map(name => frontMatter(`content/en/modules/${slug}/${name}`).minutes)).toEqual(module.minutes)
    expect(frontMatter(`content/en/modules/${slug}/index.md`).checklist.map((step: { id: string }) => step.id)).toEqual(module.checklist)
  })

  it('names the talks by the titles of the content', () => {
    for (const talk of demoTalks) {
      expect(frontMatter(`content/en/talks/${talk.slug}.md`)).toMatchObject({ title: talk.title.en, work: talk.work })
      expect(frontMatter(`content/es/talks/${talk.slug}.md`)).toMatchObject({ title: talk.title.es })
    }
  })
})
