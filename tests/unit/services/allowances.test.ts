import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '~~/server/data/database'
import { listAllowancesOf } from '~~/server/data/allowances'
import { allowForAShift } from '~~/server/services/allowances'
import { readClearance } from '~~/server/services/clearance'
import { Refusal } from '~~/server/services/refusal'
import { openLearningCompany, workAfter } from '../../support/learning-company'

const at = '2026-01-05T14:00:00.000Z'
let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
  await db('sites').insert([{ id: 'north', code: 'north', name: 'North', timeZone: 'America/Denver', createdAt: at }])
  await db('crews').insert({ id: 'crew', name: 'Crew', foremanId: 'frank', createdAt: at })
  await db('people').whereIn('id', ['nora', 'frank']).update({ crewId: 'crew' })
  await db('assignments').insert({ id: 'a', crewId: 'crew', siteId: 'north', startsOn: '2026-11-02', createdAt: at })
  await db('rules').del()
  const duty = await db('duties').where({ code: 'stacker' }).first('id')
  await db('rules').insert({ id: 'rule', dutyId: duty.id, createdAt: at })
  const type = async (code: string) => (await db('credentialTypes').where({ code }).first('id')).id as string
  await db('ruleTypes').insert({ ruleId: 'rule', groupNumber: 1, typeId: await type('fall-protection') })
  await db('credentials').insert([
    { id: 'card', personId: 'nora', typeId: await type('fall-protection'), issuedOn: '2026-11-02', verification: 'unverified', cardCode: 'CARD', createdAt: at },
    { id: 'fit', personId: 'nora', typeId: await type('respirator-fit'), issuedOn: '2026-11-02', expiresOn: '2027-11-02', verification: 'unverified', cardCode: 'FIT', createdAt: at },
  ])
})
const frank = (minutes = 0) => workAfter(db, 'frank', minutes, 'foreman')
const name = (personId: string) => db('designations').insert({ id: `d-${personId}`, personId, kind: 'competent', subject: 'fall', siteId: 'north', authority: 'may stop', startsOn: '2026-01-05', createdAt: at })
const ask = { credentialId: 'card', siteId: 'north', date: '2026-12-01' }
const stacker = async (date: string) => (await readClearance(await frank(), { site: 'north', date, duty: 'stacker' })).people.find(person => person.personId === 'nora')!.duties[0]!
async function refusalOf(promise: Promise<unknown>) {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return `${error.kind} ${error.code}`
}

describe('a one-shift allowance', () => {
  it('clears for that day at that site only, and stands with a name for that day\'s sheet', async () => {
    await name('frank')
    expect((await stacker('2026-12-01')).state).toBe('notCleared')
    const given = await allowForAShift(await frank(), ask)
    expect(await allowForAShift(await frank(5), ask)).toEqual(given)
    expect(await stacker('2026-12-01')).toMatchObject({ state: 'cleared', until: '2026-12-01' })
    expect((await stacker('2026-12-02')).state).toBe('notCleared')
    expect(await listAllowancesOf(db, { siteId: 'north', date: '2026-12-01' })).toEqual([{ person: 'Person nora', type: 'fall-protection', allowedBy: 'Person frank' }])
    expect(await db('audit').where({ action: 'allowance.given' }).first('actorId')).toEqual({ actorId: 'frank' })
  })

  it('is refused to who is not named at the site, for another day, for one\'s own card, and where the law asks for the evaluation itself', async () => {
    expect(await refusalOf(allowForAShift(await frank(), ask))).toBe('forbidden notCompetentPerson')
    await name('frank')
    await name('nora')
    expect(await refusalOf(allowForAShift(await frank(), { ...ask, date: '2026-12-02' }))).toBe('unprocessable onlyToday')
    expect(await refusalOf(allowForAShift(await workAfter(db, 'nora'), ask))).toBe('forbidden ownCard')
    expect(await refusalOf(allowForAShift(await frank(), { ...ask, credentialId: 'fit' }))).toBe('unprocessable lawAsks')
    expect(await refusalOf(allowForAShift(await frank(), { ...ask, credentialId: 'none' }))).toBe('notFound notFound')
    await db('credentials').where({ id: 'card' }).update({ verification: 'rejected' })
    expect(await refusalOf(allowForAShift(await frank(), ask))).toBe('conflict alreadyJudged')
    expect(await db('allowances').select('id')).toEqual([])
  })
})
