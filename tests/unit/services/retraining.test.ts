import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '~~/server/data/database'
import { reportNearMiss } from '~~/server/services/near-misses'
import { Refusal } from '~~/server/services/refusal'
import { changeRetrainingRule, decideRetraining, readRetraining, readRetrainingRules } from '~~/server/services/retraining'
import { makeAssessor, openLearningCompany, workAfter } from '../../support/learning-company'

const at = '2026-01-05T14:00:00.000Z'
let db: Db
let report: string
beforeEach(async () => {
  db = await openLearningCompany()
  await db('sites').insert([{ id: 'north', code: 'north', name: 'North', timeZone: 'America/Denver', createdAt: at }])
  await db('assignments').insert(['nora', 'olek'].map(personId => ({ id: personId, personId, siteId: 'north', startsOn: '2026-11-02', createdAt: at })))
  await makeAssessor(db, 'nora', 'bracing-and-plumb')
  report = (await reportNearMiss(await workAfter(db, 'olek', 5), { siteId: 'north', kind: 'braceFailed', what: 'A foot walked.', when: '2026-12-01T13:00:00.000Z' })).id
})
const sara = (minutes = 9) => workAfter(db, 'sara', minutes, 'safety')
const stateOf = async () => (await db('credentials').where({ id: 'c-nora-bracing-and-plumb' }).first('withdrawnOn', 'withdrawalReason'))

describe('retraining after a report', () => {
  it('is proposed with the people of that day, and takes nothing from anybody by itself', async () => {
    expect(await readRetraining(await sara(), report)).toEqual({
      modules: ['bracing-and-plumb'], decided: [],
      people: [{ personId: 'nora', name: 'Person nora', holds: ['bracing-and-plumb'] }, { personId: 'olek', name: 'Person olek', holds: [] }],
    })
    expect((await stateOf()).withdrawnOn).toBeNull()
  })

  it('decided without ending the card invites and leaves the card; decided with it takes the card back with the report as its reason', async () => {
    await db('people').where({ id: 'nora' }).update({ email: 'nora@test.example' })
    await decideRetraining(await sara(), report, { steps: [{ personId: 'olek', modules: ['bracing-and-plumb'] }], ends: false })
    expect((await stateOf()).withdrawnOn).toBeNull()
    const view = await decideRetraining(await sara(), report, { steps: [{ personId: 'nora', modules: ['bracing-and-plumb'] }], ends: true })
    expect(view.decided).toMatchObject([{ personId: 'nora', ended: true, isDone: false }, { personId: 'olek', ended: false }])
    expect(await stateOf()).toMatchObject({ withdrawnOn: '2026-12-01', withdrawalReason: expect.stringContaining(report) as string })
    expect(await db('mail').where({ recipient: 'nora@test.example' }).first('body')).toMatchObject({ body: expect.stringContaining('/learn/bracing-and-plumb') as string })
    await expect(decideRetraining(await sara(), report, { steps: [{ personId: 'nora', modules: ['bracing-and-plumb'] }], ends: true })).rejects.toThrow(Refusal)
  })

  it('follows the company\'s own rule for a kind, which is changed with a trace', async () => {
    await changeRetrainingRule(await sara(), 'braceFailed', ['bracing-and-plumb', 'stacking'])
    expect((await readRetraining(await sara(), report)).modules).toEqual(['bracing-and-plumb', 'stacking'])
    expect((await readRetrainingRules(await sara())).items.find(rule => rule.kind === 'blowout')?.modules).toEqual(['blowout-response', 'pour-rate'])
    await expect(changeRetrainingRule(await sara(), 'braceFailed', ['knitting'])).rejects.toThrow(Refusal)
    expect(await db('audit').where({ action: 'retrainingRule.changed' })).toHaveLength(1)
  })
})
