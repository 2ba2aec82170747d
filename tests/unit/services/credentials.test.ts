import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { newCredential, type NewCredential } from '#shared/schemas/credentials'
import type { Db } from '../../../server/data/database'
import { addCredential, judgeCredential, readCredential, readCredentials, readExpiryDays, withdrawCredential } from '../../../server/services/credentials'
import { makeCardToken } from '../../../server/services/cards'
import { checkCard } from '../../../server/services/card-check'
import { endCalendarFeeds, makeCalendarFeed, readCalendarFeed } from '../../../server/services/calendar-feed'
import { hold, openCredentialCompany, workOf } from '../../support/credential-company'
import { actorOf, testSettings, workFor } from '../../support/work'

let db: Db
beforeAll(async () => {
  db = await openCredentialCompany()
})
afterAll(() => db.destroy())

const input = (changes: Partial<NewCredential> = {}): NewCredential => ({ personId: 'hal', type: 'ladders', issuedOn: '2026-11-30', ...changes })
const idsOf = async (who: 'sam' | 'ada' | 'fay' | 'hal' | 'ines', filters: object = {}) => (await readCredentials(await workOf(db, who), { page: 1, perPage: 200, ...filters })).items.map(item => item.id)

describe('adding a card', () => {
  test('computes the expiry from the type and counts for nothing until it is verified', async () => {
    const added = await addCredential(await workOf(db, 'hal'), input({ type: 'lift-truck', issuedOn: '2028-02-29', details: { trainer: 'A\nB' } }))
    expect(added).toMatchObject({ person: 'Hal Hand', type: 'lift-truck', expiresOn: '2031-02-28', state: 'unverified', cardCode: null, details: { trainer: 'A\nB' } })
    expect(added.missingDetails.map(detail => detail.field)).toEqual(['evaluator', 'evaluatedOn', 'equipment'])
  })

  test.each<[string, Partial<NewCredential>, string, string]>([
    ['a printed type without its date', { type: 'first-aid-cpr' }, 'expiresOnNeeded', 'expiresOn'],
    ['a computed type with a date', { expiresOn: '2027-01-01' }, 'expiresOnRefused', 'expiresOn'],
    ['a date before the issue', { type: 'first-aid-cpr', expiresOn: '2026-11-29' }, 'expiresBeforeIssue', 'expiresOn'],
    ['a taught module', { type: 'stacking' }, 'moduleOnly', 'type'],
    ['an unknown type', { type: 'juggling' }, 'unknownType', 'type'],
    ['an orientation without its site', { type: 'site-orientation' }, 'siteNeeded', 'siteId'],
    ['an unknown site', { type: 'site-orientation', siteId: 'nowhere' }, 'unknownSite', 'siteId'],
    ['an unknown file', { fileId: 'nothing' }, 'unknownFile', 'fileId'],
    ['a medical form', { type: 'respirator-medical', fileId: 'any' }, 'factOnly', 'fileId'],
  ])('refuses %s', async (_what, changes, code, field) => {
    const before = await db('credentials').count({ n: '*' }).first()
    await expect(addCredential(await workOf(db, 'hal'), input(changes))).rejects.toMatchObject({ kind: 'unprocessable', code, details: { fields: { [field]: expect.any(String) } } })
    expect(await db('credentials').count({ n: '*' }).first()).toEqual(before)
  })

  test('is for oneself or by the safety manager', async () => {
    await expect(addCredential(await workOf(db, 'hal'), input({ personId: 'ines' }))).rejects.toMatchObject({ kind: 'notFound' })
    await expect(addCredential(await workOf(db, 'fay'), input({ personId: 'ines' }))).rejects.toMatchObject({ kind: 'notFound' })
    await expect(addCredential(await workOf(db, 'fay'), input({ personId: 'hal' }))).rejects.toMatchObject({ kind: 'forbidden' })
    await expect(addCredential(await workOf(db, 'sam'), input({ personId: 'nobody' }))).rejects.toMatchObject({ kind: 'notFound' })
    expect(await addCredential(await workOf(db, 'sam'), input({ personId: 'ines' }))).toMatchObject({ personId: 'ines', state: 'unverified', addedBy: 'Sam Safe' })
  })

  test('takes free text with line breaks and refuses control characters, wrong dates and unknown fields', () => {
    expect(newCredential.safeParse(input({ issuer: 'Red\nBarn, Inc.' })).success).toBe(true)
    for (const wrong of [{ issuer: 'a\u0007b' }, { issuedOn: '2026-02-30' }, { state: 'verified' }, { number: 'x'.repeat(101) }, { personId: 7 }]) {
      expect(newCredential.safeParse({ ...input(), ...wrong }).success, JSON.stringify(wrong)).toBe(false)
    }
  })
})

describe('judging', () => {
  test('verifies once, and a second time conflicts', async () => {
    const { id } = await addCredential(await workOf(db, 'hal'), input())
    const sam = await workOf(db, 'sam')
    expect(await judgeCredential(sam, id, { accept: true, note: 'seen' })).toMatchObject({ state: 'inDate', verifiedBy: 'Sam Safe', verificationNote: 'seen', cardCode: expect.stringMatching(/^[0-9A-Z]{18}$/) })
    await expect(judgeCredential(sam, id, { accept: false })).rejects.toMatchObject({ kind: 'conflict', code: 'alreadyJudged' })
  })

  test('keeps a rejected card', async () => {
    const { id } = await addCredential(await workOf(db, 'hal'), input())
    expect(await judgeCredential(await workOf(db, 'sam'), id, { accept: false, note: 'unreadable' })).toMatchObject({ state: 'rejected' })
    expect(await idsOf('hal', { state: ['rejected'] })).toContain(id)
  })

  test('withdraws from today with a reason, once, and leaves an audit row', async () => {
    const id = await hold(db, { type: 'ladders' })
    const sam = await workOf(db, 'sam')
    expect(await withdrawCredential(sam, id, { reason: 'Fall on\nNov 28' })).toMatchObject({ state: 'withdrawn', withdrawnOn: '2026-12-01', withdrawalReason: 'Fall on\nNov 28' })
    await expect(withdrawCredential(sam, id, { reason: 'again' })).rejects.toMatchObject({ kind: 'conflict', code: 'alreadyWithdrawn' })
    expect(await db('audit').where({ subjectId: id }).pluck('action')).toEqual(['credential.withdrawn'])
    expect((await readCredential(await workOf(db, 'fay'), id)).withdrawalReason).toBeNull()
  })
})

describe('who sees what', () => {
  test('a hand their own, a foreman the crew\'s, the office their own, the safety manager all', async () => {
    const own = await hold(db, { personId: 'hal' })
    const others = await hold(db, { personId: 'ines' })
    const office = await hold(db, { personId: 'ada' })
    expect(await idsOf('hal')).toContain(own)
    expect(await idsOf('hal')).not.toContain(others)
    expect(await idsOf('fay')).toEqual(expect.arrayContaining([own]))
    expect(await idsOf('fay')).not.toContain(others)
    expect(await idsOf('ada')).toEqual([office])
    expect(await idsOf('sam')).toEqual(expect.arrayContaining([own, others, office]))
    await expect(readCredential(await workOf(db, 'hal'), others)).rejects.toMatchObject({ kind: 'notFound' })
    await expect(readCredential(await workOf(db, 'sam'), 'nothing')).rejects.toMatchObject({ kind: 'notFound' })
  })

  test('the card\'s code is for its holder and the safety manager', async () => {
    const id = await hold(db)
    expect((await readCredential(await workOf(db, 'fay'), id)).cardCode).toBeNull()
  })
})

describe('filters', () => {
  test('`within` reaches from today to today and the days, both included, and forgets what was renewed', async () => {
    const person = { personId: 'ines', type: 'first-aid-cpr' }
    await db('credentials').where({ personId: 'ines' }).delete()
    const old = await hold(db, { ...person, issuedOn: '2022-12-01', expiresOn: '2024-12-01' })
    expect(await idsOf('sam', { within: 60, person: 'ines' })).toEqual([])
    expect(await idsOf('sam', { within: 60, includeExpired: true, person: 'ines' })).toEqual([old])
    const last = await hold(db, { ...person, expiresOn: '2027-01-30' })
    expect(await idsOf('sam', { within: 60, person: 'ines' })).toEqual([last])
    expect(await idsOf('sam', { within: 59, person: 'ines' })).toEqual([])
    expect(await idsOf('sam', { within: 60, includeExpired: true, person: 'ines' })).toEqual([last])
    expect(await readExpiryDays(await workOf(db, 'sam'), { within: 60, person: 'ines' })).toEqual({ items: [{ date: '2027-01-30', count: 1 }], total: 1, today: '2026-12-01' })
  })

  test('`within` leaves out people who left', async () => {
    const gone = await hold(db, { personId: 'ines', type: 'respirator-fit', expiresOn: '2026-12-20' })
    await db('people').where({ id: 'ines' }).update({ leftOn: '2026-11-30' })
    expect(await idsOf('sam', { within: 60, type: 'respirator-fit' })).not.toContain(gone)
    await db('people').where({ id: 'ines' }).update({ leftOn: '2026-12-01' })
    expect(await idsOf('sam', { within: 60, type: 'respirator-fit' })).toContain(gone)
    await db('people').where({ id: 'ines' }).update({ leftOn: null })
  })

  test('`site` means rostered there today, by the crew or in person', async () => {
    const hal = await hold(db, { personId: 'hal', type: 'silica' })
    const ines = await hold(db, { personId: 'ines', type: 'silica' })
    expect(await idsOf('sam', { site: 'site1', type: 'silica' })).toEqual([hal])
    await db('assignments').insert({ id: 'as2', personId: 'ines', siteId: 'site1', startsOn: '2026-12-01', endsOn: '2026-12-01', createdAt: '2026-11-01T00:00:00.000Z' })
    expect(await idsOf('sam', { site: 'site1', type: 'silica' })).toEqual([hal, ines])
    expect(await idsOf('sam', { site: 'nowhere' })).toEqual([])
  })

  test('finds text in names, numbers and types, taking % and _ as they are', async () => {
    const id = await hold(db, { number: '50%_a' })
    expect(await idsOf('sam', { q: '50%_' })).toEqual([id])
    expect(await idsOf('sam', { q: '%%%' })).toEqual([])
  })

  test('sorts what never expires last in both directions', async () => {
    for (const sort of ['expiresOn', '-expiresOn']) {
      const { items } = await readCredentials(await workOf(db, 'sam'), { page: 1, perPage: 200, sort: sort as 'expiresOn' })
      const dates = items.map(item => item.expiresOn)
      const known = dates.filter(date => date !== null)
      expect(dates.slice(known.length).every(date => date === null)).toBe(true)
      expect(known).toEqual([...known].sort((a, b) => (sort === 'expiresOn' ? a.localeCompare(b) : b.localeCompare(a))))
    }
  })
})

describe('what a stranger learns', () => {
  const stranger = () => workFor(db, null)

  test('valid or not, type, initials and the day, nothing more; good on the last day and not on the next', async () => {
    const id = await hold(db, { personId: 'ines', expiresOn: '2026-12-01' })
    const code = `CARD${id.toUpperCase()}`
    await db('credentials').where({ id }).update({ cardCode: '7G3K9QW2M4XTBN5PZA' })
    expect(await checkCard(await stranger(), '7g3k9q-w2m4xt-bn5pza', '10.0.0.1')).toEqual({ valid: true, type: 'first-aid-cpr', initials: 'IQ', checkedOn: '2026-12-01' })
    const tomorrow = await workFor(db, null, { now: '2026-12-02T07:00:00.000Z' })
    expect(await checkCard(tomorrow, '7G3K9QW2M4XTBN5PZA', '10.0.0.1')).toEqual({ valid: false, type: 'first-aid-cpr', initials: 'IQ', checkedOn: '2026-12-02' })
    await expect(checkCard(await stranger(), code, '10.0.0.1')).rejects.toMatchObject({ kind: 'notFound' })
  })

  test('who guesses has to wait, and a right code is still answered', async () => {
    for (let n = 0; n < 20; n++) await expect(checkCard(await stranger(), `GUESS${n}`, '10.0.0.2')).rejects.toMatchObject({ kind: 'notFound' })
    await expect(checkCard(await stranger(), 'GUESS20', '10.0.0.2')).rejects.toMatchObject({ kind: 'tooMany', details: { retryAfter: 30 } })
    await expect(checkCard(await stranger(), 'GUESS21', '10.0.0.3')).rejects.toMatchObject({ kind: 'notFound' })
    expect(await checkCard(await stranger(), '7G3K9QW2M4XTBN5PZA', '10.0.0.2')).toMatchObject({ valid: true })
  })
})

describe('calendar feed', () => {
  const feed = async (url: string) => readCalendarFeed(await workFor(db, null), url.split('/').at(-1)!)

  test('shows its owner\'s renewals until it is ended', async () => {
    const work = await workOf(db, 'hal')
    await hold(db, { type: 'respirator-fit', expiresOn: '2027-02-01' })
    const { url } = await makeCalendarFeed(work, {}, 'https://walls.test')
    expect(url).toMatch(/^https:\/\/walls\.test\/api\/calendar\/[\w-]{32}\.ics$/)
    const text = await feed(url)
    expect(text).toContain('Hal Hand')
    expect(text).not.toContain('Quispe')
    await endCalendarFeeds(work)
    await expect(feed(url)).rejects.toMatchObject({ kind: 'notFound' })
  })

  test('of a badge sign-in never widens to what the role may see', async () => {
    const badge = await workFor(db, { ...actorOf('sam', 'worker', 'badge'), givenRole: 'safety' })
    await hold(db, { personId: 'sam', expiresOn: '2027-05-01' })
    const { url } = await makeCalendarFeed(badge, {}, 'https://walls.test')
    const text = await feed(url)
    expect(text).toContain('Sam Safe')
    expect(text).not.toContain('Hal Hand')
  })
})

test('the signed card names the last good second in the company\'s zone and is the key\'s own', async () => {
  const { verify } = await import('node:crypto')
  const { mkdtempSync } = await import('node:fs')
  const { loadSigningKey } = await import('../../../server/services/signing-key')
  const settings = testSettings({ databasePath: `${mkdtempSync('/tmp/pourwright-key-')}/db.sqlite` })
  const id = await hold(db, { expiresOn: '2027-03-13' })
  const token = await makeCardToken(await workOf(db, 'hal', { settings }), id, 'https://walls.test')
  const [head, claims, signature] = token.split('.') as [string, string, string]
  expect(verify(null, Buffer.from(`${head}.${claims}`), loadSigningKey(settings).publicKey, Buffer.from(signature, 'base64url'))).toBe(true)
  expect(JSON.parse(Buffer.from(claims, 'base64url').toString())).toMatchObject({ iss: 'https://walls.test', name: 'First aid and CPR', credentialSubject: { identifier: [{ identityHash: 'Hal Hand' }] }, exp: Date.parse('2027-03-14T07:00:00Z') / 1000 })
  const waiting = await hold(db, { type: 'ladders', verification: 'unverified' })
  await expect(makeCardToken(await workOf(db, 'hal', { settings }), waiting, 'x')).rejects.toMatchObject({ kind: 'conflict', code: 'notCounting' })
})
