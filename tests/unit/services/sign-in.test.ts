import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '../../../server/data/database'
import { insertCompany } from '../../../server/data/company'
import { writeSecret } from '../../../server/data/sign-in-secrets'
import { hashSecret } from '../../../server/services/passwords'
import { Refusal } from '../../../server/services/refusal'
import { readSession } from '../../../server/services/sessions'
import { signIn } from '../../../server/services/sign-in'
import { changeOwnSecret } from '../../../server/services/own-sign-in'
import { insertTestPerson, openTestDatabase, actorOf, testSettings, workFor } from '../../support/work'

const passwordHash = await hashSecret('three red buckets of rain')
const pinHash = await hashSecret('739416')
const at = (minutes: number) => new Date(Date.parse('2026-12-01T13:30:00Z') + minutes * 60_000).toISOString()
let db: Db

const refusal = (promise: Promise<unknown>) => promise.then(() => null, (error: unknown) => (error instanceof Refusal ? error : Promise.reject(error)))
const tryPin = async (pin: string, { badge = '2041', address = '10.0.0.7', now = at(0) } = {}) => signIn(await workFor(db, null, { now }), { badge, pin }, address)
const actorBehind = async (cookie: string) => (await readSession(db, testSettings(), cookie.split(';')[0]!, '2026-12-01')).actor

beforeEach(async () => {
  db = await openTestDatabase()
  await insertCompany(db, { name: 'Test Walls', timeZone: 'America/Denver', language: 'en', isDemo: false }, at(0))
  await insertTestPerson(db, { id: 'boss', role: 'foreman', badge: '2041', email: 'boss@test.example' })
  await writeSecret(db, 'boss', { passwordHash }, at(0))
  await writeSecret(db, 'boss', { pinHash }, at(0))
  return () => db.destroy()
})

describe('signing in', () => {
  it('by badge gives a foreman a worker\'s abilities, and by password their own', async () => {
    const byBadge = await tryPin('739416')
    expect(byBadge.person.role).toBe('worker')
    expect(await actorBehind(byBadge.cookie)).toMatchObject({ role: 'worker', givenRole: 'foreman', via: 'badge' })
    const byPassword = await signIn(await workFor(db, null), { email: 'boss@test.example', password: 'three red buckets of rain' }, '10.0.0.7')
    expect(byPassword.person.role).toBe('foreman')
    expect(await actorBehind(byPassword.cookie)).toMatchObject({ role: 'foreman', via: 'password' })
  })

  it('remembers the first time only', async () => {
    await tryPin('739416', { now: at(1) })
    await tryPin('739416', { now: at(9) })
    expect(await db('signInSecrets').first('firstUsedAt')).toEqual({ firstUsedAt: at(1) })
  })

  it('answers the same words for an unknown badge as for a wrong PIN', async () => {
    const unknown = await refusal(tryPin('739416', { badge: '9999' }))
    const wrong = await refusal(tryPin('111111'))
    expect([unknown?.code, unknown?.kind]).toEqual([wrong?.code, wrong?.kind])
    expect(unknown?.code).toBe('wrongPin')
  })

  it('is over on the day on which somebody leaves, and not on the day before', async () => {
    await db('people').update({ leftOn: '2026-12-02' })
    await expect(tryPin('739416', { now: at(0) })).resolves.toBeTruthy()
    expect((await refusal(tryPin('739416', { now: at(24 * 60) })))?.code).toBe('wrongPin')
  })
})

describe('wrong tries', () => {
  it('are free four times, then wait 30 seconds after the fifth, even with the right PIN', async () => {
    for (let tried = 0; tried < 5; tried++) expect((await refusal(tryPin('111111')))?.code).toBe('wrongPin')
    const slowed = await refusal(tryPin('739416'))
    expect([slowed?.kind, slowed?.details.retryAfter]).toEqual(['tooMany', 30])
    await expect(tryPin('739416', { now: at(0.51) })).resolves.toBeTruthy()
  })

  it('wait twice as long each time', async () => {
    for (let tried = 0; tried < 5; tried++) await refusal(tryPin('111111'))
    expect((await refusal(tryPin('111111', { now: at(1) })))?.kind).toBe('notSignedIn')
    expect((await refusal(tryPin('111111', { now: at(1) })))?.details.retryAfter).toBe(60)
  })

  it('behind one address do not stop the rest of the crew, nor the same person elsewhere', async () => {
    await insertTestPerson(db, { id: 'hand', badge: '2042' })
    await writeSecret(db, 'hand', { pinHash }, at(0))
    for (let tried = 0; tried < 6; tried++) await refusal(tryPin('111111'))
    await expect(tryPin('739416', { badge: '2042' })).resolves.toBeTruthy()
    await expect(tryPin('739416', { address: '10.0.0.8' })).resolves.toBeTruthy()
  })

  it('from a hundred addresses slow the account itself', async () => {
    await db('signInWaits').delete()
    for (let tried = 0; tried < 100; tried++) await refusal(tryPin('111111', { address: `10.1.0.${tried}` }))
    expect((await refusal(tryPin('739416', { address: '10.2.0.1' })))?.kind).toBe('tooMany')
  })

  it('sent all at once gain nothing', async () => {
    const answers = await Promise.all(Array.from({ length: 20 }, () => refusal(tryPin('111111'))))
    expect(answers.filter(answer => answer?.kind === 'notSignedIn')).toHaveLength(5)
    expect(answers.filter(answer => answer?.kind === 'tooMany')).toHaveLength(15)
  })

  it('are forgotten after a day without any', async () => {
    for (let tried = 0; tried < 5; tried++) await refusal(tryPin('111111'))
    await refusal(tryPin('111111', { now: at(25 * 60) }))
    await expect(tryPin('739416', { now: at(25 * 60) })).resolves.toBeTruthy()
  })
})

describe('changing one\'s own secret', () => {
  it('ends every other session and keeps this one', async () => {
    const other = await tryPin('739416')
    const cookie = await changeOwnSecret(await workFor(db, actorOf('boss', 'foreman')), { current: 'three red buckets of rain', pin: '580372' })
    expect(await actorBehind(other.cookie)).toBeNull()
    expect(await actorBehind(cookie)).toMatchObject({ personId: 'boss', via: 'password' })
    expect((await refusal(tryPin('739416')))?.code).toBe('wrongPin')
    await expect(tryPin('580372')).resolves.toBeTruthy()
  })

  it('asks for the present one, and slows down guessing', async () => {
    const work = await workFor(db, actorOf('boss', 'foreman'))
    for (let tried = 0; tried < 5; tried++) expect((await refusal(changeOwnSecret(work, { current: 'wrong', pin: '580372' })))?.code).toBe('wrongCurrent')
    expect((await refusal(changeOwnSecret(work, { current: 'three red buckets of rain', pin: '580372' })))?.kind).toBe('tooMany')
  })

  it('never lets a badge sign-in set a password', async () => {
    const work = await workFor(db, { ...actorOf('boss', 'worker', 'badge'), givenRole: 'foreman' })
    expect((await refusal(changeOwnSecret(work, { current: '739416', password: 'three blue buckets of rain' })))?.code).toBe('passwordSignInNeeded')
  })

  it.each([
    ['fourteen chars', 'passwordTooShort'],
    ['aaaaaaaaaaaaaaaaaaaa', 'passwordTooCommon'],
    ['passwordpassword', 'passwordTooCommon'],
    ['123456789012345', 'passwordTooCommon'],
    ['qwertyuiopasdfgh', 'passwordTooCommon'],
    ['TestWallsTestWalls', 'passwordTooCommon'],
    ['pourwrightpourwright', 'passwordTooCommon'],
    ['boss@test.example', 'passwordTooCommon'],
  ])('refuses the password "%s" (%s)', async (password, code) => {
    const refused = await refusal(changeOwnSecret(await workFor(db, actorOf('boss', 'foreman')), { current: 'three red buckets of rain', password }))
    expect([refused?.kind, refused?.code, Object.keys(refused?.details.fields ?? {})]).toEqual(['unprocessable', code, ['password']])
  })

  it.each(['correct horse battery staple', 'el muro sube despacio hoy', 'ñandú verde bajo la lluvia', '🧱🧱 mortar and rain 🧱'])('takes any characters, without rules on their kinds: "%s"', async (password) => {
    await changeOwnSecret(await workFor(db, actorOf('boss', 'foreman')), { current: 'three red buckets of rain', password })
    await expect(signIn(await workFor(db, null), { email: 'boss@test.example', password: password.normalize('NFD') }, '10.0.0.7')).resolves.toBeTruthy()
  })
})
