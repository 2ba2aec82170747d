import { beforeEach, describe, expect, it } from 'vitest'
import type { CrewingBody } from '#shared/schemas/crewing'
import type { Db } from '~~/server/data/database'
import { crewDay, inviteToModules, readUsualDay } from '~~/server/services/crewing'
import { Refusal } from '~~/server/services/refusal'
import { makeAssessor, openLearningCompany, workAfter } from '../../support/learning-company'
import { readRealTeaching } from '../../support/teaching'

const teaching = readRealTeaching()
const at = '2026-01-05T14:00:00.000Z'
let db: Db
const duty = async (code: string) => (await db('duties').where({ code }).first('id')).id as string

beforeEach(async () => {
  db = await openLearningCompany()
  await db('sites').insert({ id: 'north', code: 'north', name: 'North', timeZone: 'America/Denver', createdAt: at })
  await db('crews').insert({ id: 'walls', name: 'Walls', foremanId: 'frank', createdAt: at })
  await db('people').whereIn('id', ['nora', 'olek']).update({ crewId: 'walls' })
  await db('assignments').insert({ id: 'a1', crewId: 'walls', siteId: 'north', startsOn: '2026-11-30', endsOn: null, createdAt: at })
  await db('crewDuties').insert({ crewId: 'walls', dutyId: await duty('stacker'), count: 2 })
  await db('rules').del()
  await db('rules').insert({ id: 'r1', dutyId: await duty('stacker'), siteId: null, createdAt: at })
  await db('ruleTypes').insert({ ruleId: 'r1', groupNumber: 0, typeId: (await db('credentialTypes').where({ code: 'stacking' }).first('id')).id })
})
const sara = () => workAfter(db, 'sara', 0, 'safety')
const ask = async (body: Partial<CrewingBody> = {}, who = sara()) => crewDay(await who, teaching, { siteId: 'north', date: '2026-12-01', slots: [{ duty: 'stacker', count: 2 }], ...body })
async function refusalOf(promise: Promise<unknown>) {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return { kind: error.kind, code: error.code, fields: Object.keys(error.details.fields ?? {}) }
}

describe('a day\'s crewing', () => {
  it('starts from the slots saved for the crews rostered there', async () => {
    expect(await readUsualDay(await sara(), { site: 'north' })).toMatchObject({ date: '2026-12-01', slots: [{ duty: 'stacker', count: 2 }], people: [{ id: 'nora' }, { id: 'olek' }] })
  })

  it('is short with its reason and the shortest fix in minutes of lessons, quiz and hands-on', async () => {
    await makeAssessor(db, 'nora', 'stacking')
    const day = await ask()
    const { lessons, bank, text } = teaching.get('stacking')!
    const minutes = lessons.reduce((sum, lesson) => sum + lesson.minutes, 0) + bank.quizLength + text.en.checklist.length * 5
    expect(day).toMatchObject({ crewed: false, short: [{ duty: 'stacker', count: 1 }], because: { duties: ['stacker'], people: ['nora'] }, fix: { minutes, steps: [{ personId: 'olek', duty: 'stacker', modules: ['stacking'] }] } })
    expect(day.unfillable).toBeUndefined()
  })

  it('is crewed when both hold it, and asks for a first aider when told to', async () => {
    await makeAssessor(db, 'nora', 'stacking')
    await makeAssessor(db, 'olek', 'stacking')
    expect((await ask()).crewed).toBe(true)
    expect(await ask({ presence: [{ type: 'first-aid-cpr' }] })).toMatchObject({ crewed: false, short: [], presenceMissing: [{ type: 'first-aid-cpr' }] })
    expect((await ask({ presence: [{ designation: 'assessor', subject: 'stacking' }] })).crewed).toBe(true)
  })

  it('keeps who was placed by hand, and takes other people than the roster when they are named', async () => {
    await makeAssessor(db, 'nora', 'stacking')
    await makeAssessor(db, 'frank', 'stacking')
    expect((await ask({ slots: [{ duty: 'stacker', count: 1 }], locked: [{ duty: 'stacker', personId: 'nora' }] })).assignment).toEqual([{ duty: 'stacker', personId: 'nora' }])
    expect((await ask({ personIds: ['nora', 'frank'] })).crewed).toBe(true)
  })

  it('refuses what it can\'t compute, and a site that is not the actor\'s', async () => {
    expect(await refusalOf(ask({ slots: [{ duty: 'welder', count: 1 }] }))).toMatchObject({ kind: 'unprocessable', fields: ['slots.0.duty'] })
    expect(await refusalOf(ask({ locked: [{ duty: 'stacker', personId: 'frank' }] }))).toMatchObject({ code: 'notRostered', fields: ['locked'] })
    expect(await refusalOf(ask({ presence: [{ type: 'no-such' }] }))).toMatchObject({ fields: ['presence.0.type'] })
    expect(await refusalOf(ask({ personIds: ['nobody'] }))).toMatchObject({ fields: ['personIds'] })
    expect(await refusalOf(ask({}, workAfter(db, 'olek', 0, 'foreman')))).toMatchObject({ kind: 'notFound' })
  })

  it('invites to the modules of a fix once a day, and says who has no address', async () => {
    await db('people').where({ id: 'olek' }).update({ email: 'olek@test.example', language: 'es' })
    const steps = [{ personId: 'olek', modules: ['stacking'] }, { personId: 'nora', modules: ['stacking', 'steel'] }]
    expect(await inviteToModules(await sara(), { steps })).toEqual({ queued: 1, withoutEmail: [{ personId: 'nora', name: 'Person nora' }] })
    await inviteToModules(await sara(), { steps })
    const mail = await db('mail').select('subject', 'body')
    expect(mail).toHaveLength(1)
    expect(mail[0]!.body).toContain('https://pourwright.test/learn/stacking')
    expect(await refusalOf(inviteToModules(await sara(), { steps: [{ personId: 'olek', modules: ['welding'] }] }))).toMatchObject({ fields: ['steps.0.modules'] })
  })
})
