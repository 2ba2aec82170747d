import { randomUUID } from 'node:crypto'
import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '../../../server/data/database'
import { readClearance, openClearanceBook } from '../../../server/services/clearance'
import { expectedPeople } from '../../../server/services/roster'
import { seedReference } from '../../../seeds/reference'
import { actorOf, insertTestPerson, openTestDatabase, workFor } from '../../support/work'

const at = '2026-01-05T14:00:00.000Z'
let db: Db

const assign = (who: { personId: string } | { crewId: string }, siteId: string, startsOn: string, endsOn: string | null = null) =>
  db('assignments').insert({ id: randomUUID(), siteId, startsOn, endsOn, createdAt: at, ...who })
const names = async (siteId: string, date: string) => (await expectedPeople(db, siteId, date)).map(person => person.id)
const give = async (personId: string, type: string, changes: Record<string, unknown> = {}) => {
  const { id: typeId } = await db('credentialTypes').where({ code: type }).first('id')
  await db('credentials').insert({ id: randomUUID(), personId, typeId, issuedOn: '2026-10-01', expiresOn: null, verification: 'verified', cardCode: randomUUID(), createdAt: at, ...changes })
}

beforeEach(async () => {
  db = await openTestDatabase()
  await seedReference(db, at)
  await db('company').insert({ id: 1, name: 'Test Walls', timeZone: 'America/Denver', createdAt: at })
  await db('crews').insert({ id: 'crew', name: 'Crew', createdAt: at })
  for (const id of ['north', 'south']) await db('sites').insert({ id, code: id, name: id, timeZone: 'America/Denver', createdAt: at })
  const stacker = await db('duties').where({ code: 'stacker' }).first('id')
  await db('crewDuties').insert({ crewId: 'crew', dutyId: stacker.id, count: 2 })
  await insertTestPerson(db, { id: 'ana', crewId: 'crew' })
  await insertTestPerson(db, { id: 'ben', crewId: 'crew' })
  await insertTestPerson(db, { id: 'lead', role: 'foreman', crewId: 'crew' })
  await db('crews').where({ id: 'crew' }).update({ foremanId: 'lead' })
  await assign({ crewId: 'crew' }, 'north', '2026-11-30', '2026-12-04')
})

describe('the roster', () => {
  it('follows the crew from the first day of its assignment to the last', async () => {
    expect(await names('north', '2026-11-29')).toEqual([])
    expect(await names('north', '2026-11-30')).toEqual(['ana', 'ben', 'lead'])
    expect(await names('north', '2026-12-04')).toEqual(['ana', 'ben', 'lead'])
    expect(await names('north', '2026-12-05')).toEqual([])
  })

  it('lets a person\'s own assignment beat the crew\'s, on its days only', async () => {
    await assign({ personId: 'ben' }, 'south', '2026-12-01', '2026-12-01')
    expect(await names('north', '2026-12-01')).toEqual(['ana', 'lead'])
    expect(await names('south', '2026-12-01')).toEqual(['ben'])
    expect(await names('north', '2026-12-02')).toEqual(['ana', 'ben', 'lead'])
  })

  it('expects nobody before the first day of work or from the day of leaving', async () => {
    await db('people').where({ id: 'ana' }).update({ hiredOn: '2026-12-02' })
    await db('people').where({ id: 'ben' }).update({ leftOn: '2026-12-02' })
    expect(await names('north', '2026-12-01')).toEqual(['ben', 'lead'])
    expect(await names('north', '2026-12-02')).toEqual(['ana', 'lead'])
  })

  it('names the duties that the crew usually does', async () => {
    expect((await expectedPeople(db, 'north', '2026-12-01'))[0]).toMatchObject({ siteId: 'north', duties: ['stacker'] })
  })
})

describe('clearance of people', () => {
  it('clears whoever holds what the duty asks for, until the first of it runs out', async () => {
    await give('ana', 'stacking', { expiresOn: '2028-10-01' })
    await give('ana', 'running-bond', { expiresOn: '2027-03-01' })
    const book = await openClearanceBook(db, { whom: ['ana', 'ben'], date: '2026-12-01' })
    expect(book.ask('ana', 'stacker', 'north')).toMatchObject({ state: 'cleared', until: '2027-03-01' })
    expect(book.ask('ben', 'stacker', 'north').missing.map(one => one.why)).toEqual([{ kind: 'neverHeld', type: 'stacking' }, { kind: 'neverHeld', type: 'running-bond' }])
  })

  it('counts the last recorded day of a pour duty, and not a later one', async () => {
    for (const type of ['concrete-for-walls', 'pour-rate', 'fall-protection']) await give('ana', type, { issuedOn: '2026-01-10' })
    const duty = await db('duties').where({ code: 'vibrator-hand' }).first('id')
    await db('dutyDays').insert({ personId: 'ana', dutyId: duty.id, doneOn: '2026-09-01' })
    const asked = async (date: string) => (await openClearanceBook(db, { whom: 'all', date })).ask('ana', 'vibrator-hand', null)
    expect(await asked('2026-08-31')).toMatchObject({ state: 'notCleared' })
    expect(await asked('2026-12-01')).toMatchObject({ state: 'cleared', until: '2027-03-01' })
    expect(await asked('2027-03-02')).toMatchObject({ state: 'notCleared' })
  })

  it('keeps a site\'s own rule and orientation to that site', async () => {
    const type = await db('credentialTypes').where({ code: 'site-orientation' }).first('id')
    await db('rules').insert({ id: 'rule', siteId: 'north', createdAt: at })
    await db('ruleTypes').insert({ ruleId: 'rule', groupNumber: 0, typeId: type.id })
    for (const code of ['stacking', 'running-bond']) await give('ana', code)
    await give('ana', 'site-orientation', { siteId: 'south' })
    const book = await openClearanceBook(db, { whom: ['ana'], date: '2026-12-01' })
    expect(book.ask('ana', 'stacker', 'south').state).toBe('cleared')
    expect(book.ask('ana', 'stacker', 'north').missing[0]).toMatchObject({ why: { kind: 'neverHeld', type: 'site-orientation' }, fix: { kind: 'orientation', siteId: 'north' } })
  })

  it('answers a foreman for an own site and knows nothing of another', async () => {
    const work = await workFor(db, actorOf('lead', 'foreman'))
    const answer = await readClearance(work, { site: 'north', duty: 'stacker' })
    expect(answer).toMatchObject({ date: '2026-12-01', people: [{ personId: 'ana' }, { personId: 'ben' }, { personId: 'lead' }] })
    expect(answer.people[0]!.duties.map(one => one.duty)).toEqual(['stacker'])
    await expect(readClearance(work, { site: 'south' })).rejects.toMatchObject({ kind: 'notFound' })
    await expect(readClearance(work, { site: 'north', duty: 'no-such' })).rejects.toMatchObject({ kind: 'notFound' })
  })

  it('never answers the hidden date or the reason of a hold', async () => {
    await db('people').where({ id: 'ana' }).update({ under18Until: '2027-06-01' })
    await db('holds').insert({ id: 'hold', personId: 'ben', startsOn: '2026-12-01', reason: 'secret-reason', createdAt: at })
    const text = JSON.stringify(await readClearance(await workFor(db, actorOf('lead', 'foreman')), { site: 'north' }))
    expect(text).not.toContain('2027-06-01')
    expect(text).not.toContain('secret-reason')
    expect(text).toContain('"onHold"')
  })
})
