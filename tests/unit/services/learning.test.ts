import { beforeEach, describe, expect, it } from 'vitest'
import { checkAuditChain } from '~~/server/data/audit'
import type { Db } from '~~/server/data/database'
import { markRead, readModule, readWall } from '~~/server/services/modules'
import { readAttempt, startAttempt, submitAttempt } from '~~/server/services/quiz'
import { Refusal } from '~~/server/services/refusal'
import { askForSignOff, listSignOffRequests, readSignOffRequest, signOff } from '~~/server/services/sign-offs'
import { openLearningCompany, makeAssessor, rightAnswers, workAfter } from '../../support/learning-company'
import { readRealTeaching } from '../../support/teaching'

/** A wall of which two blocks are written, so that the rules stand clear of how much is taught today. */
const teaching = new Map([...readRealTeaching()].filter(([slug]) => slug === 'stacking' || slug === 'running-bond'))
const slug = 'stacking'
const steps = teaching.get(slug)!.text.en.checklist.map(({ id }) => ({ id, ok: true }))
const mark = { kind: 'tap' } as const

let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
})

/** The refusal that a promise ends in. */
async function refusalOf(promise: Promise<unknown>): Promise<{ kind: string, code: string, data?: Record<string, unknown>, fields?: Record<string, string> }> {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return { kind: error.kind, code: error.code, data: error.details.data, fields: error.details.fields }
}

async function start(minutes = 0, personId = 'nora') {
  return startAttempt(await workAfter(db, personId, minutes), teaching, { slug, language: 'en' })
}
async function submit(id: string, answers: Parameters<typeof submitAttempt>[2]['answers'], minutes = 10, personId = 'nora') {
  return submitAttempt(await workAfter(db, personId, minutes), teaching, { id, answers, language: 'en' })
}
async function pass(minutes = 0) {
  const { id } = await start(minutes)
  return submit(id, await rightAnswers(db, 'nora', id), minutes + 10)
}
async function fail(minutes = 0) {
  const { id } = await start(minutes)
  return submit(id, {}, minutes + 10)
}
async function sign(by: string, role: 'foreman' | 'safety', change: Partial<Parameters<typeof signOff>[2]> = {}, minutes = 30) {
  return signOff(await workAfter(db, by, minutes, role), teaching, { personId: 'nora', module: slug, steps, mark, ...change })
}

describe('the wall', () => {
  it('has 16 blocks, of which stacking and running bond are open at first and the others not written', async () => {
    const { items, next } = await readWall(await workAfter(db, 'nora'), teaching, 'es')
    expect(items).toHaveLength(16)
    expect(items.filter(item => item.state === 'open').map(item => item.slug)).toEqual(['running-bond', 'stacking'])
    expect(items.filter(item => item.state === 'unwritten')).toHaveLength(14)
    expect(items.find(item => item.slug === 'steel')).toMatchObject({ minutes: null, lessons: [] })
    expect(next).toBe('running-bond')
  })

  it('shows a block as started once a lesson was read, and names the lesson read', async () => {
    await markRead(await workAfter(db, 'nora'), teaching, { slug, lesson: 'seat-every-block', language: 'en' })
    const { items, next } = await readWall(await workAfter(db, 'nora'), teaching, 'en')
    const block = items.find(item => item.slug === slug)!
    expect(block.state).toBe('started')
    expect(block.lessons.map(lesson => lesson.read)).toEqual([true, false, false, false])
    expect(next).toBe(slug)
  })

  it('knows no lesson that is not there', async () => {
    expect(await refusalOf(markRead(await workAfter(db, 'nora'), teaching, { slug, lesson: 'nothing', language: 'en' }))).toMatchObject({ kind: 'notFound' })
    expect(await refusalOf(markRead(await workAfter(db, 'nora'), teaching, { slug: 'steel', lesson: 'nothing', language: 'en' }))).toMatchObject({ kind: 'notFound' })
  })
})

describe('an attempt', () => {
  it('serves the quiz length with every must-know item, and neither key nor feedback', async () => {
    const { items } = await start()
    const bank = teaching.get(slug)!.bank
    expect(items).toHaveLength(bank.quizLength)
    for (const item of bank.items.filter(one => one.mustKnow)) expect(items.map(one => one.id)).toContain(item.id)
    for (const item of items) expect(Object.keys(item).filter(key => !['id', 'kind', 'stem', 'options', 'unit', 'units', 'picture'].includes(key))).toEqual([])
  })

  it('goes on with the attempt that is running, and draws anew when that is over', async () => {
    const first = await start()
    expect(await start(59)).toEqual(first)
    expect((await start(60)).id).not.toBe(first.id)
  })

  it('is refused for a module that is not written and unknown for one that does not exist', async () => {
    const work = await workAfter(db, 'nora')
    expect(await refusalOf(startAttempt(work, teaching, { slug: 'steel', language: 'en' }))).toMatchObject({ kind: 'conflict', code: 'notOpen' })
    expect(await refusalOf(startAttempt(work, teaching, { slug: 'welding', language: 'en' }))).toMatchObject({ kind: 'notFound' })
  })

  it('passes with every answer right and names the right answers', async () => {
    const result = await pass()
    expect(result).toMatchObject({ score: 1, passMark: 0.8, passed: true, mustKnowMissed: [] })
    expect(result.items.every(item => item.share === 1 && item.right !== undefined)).toBe(true)
    expect(result.credentialId).toBeUndefined()
  })

  it('fails when one must-know item is missed, whatever the score', async () => {
    const { id } = await start()
    const mustKnow = teaching.get(slug)!.bank.items.find(item => item.mustKnow)!.id
    const { [mustKnow]: _left, ...answers } = await rightAnswers(db, 'nora', id)
    const result = await submit(id, answers)
    expect(result).toMatchObject({ passed: false, mustKnowMissed: [mustKnow] })
    expect(result.score).toBeGreaterThanOrEqual(0.8)
  })

  it('names the right answer and the bank\'s feedback only for items that were answered', async () => {
    const { id } = await start()
    const right = await rightAnswers(db, 'nora', id)
    const answered = Object.keys(right)[0]!
    const { items } = await submit(id, { [answered]: right[answered]! })
    const feedback = new Map(teaching.get(slug)!.bank.items.map(item => [item.id, item.feedback.en]))
    for (const item of items) {
      expect(item.right !== undefined).toBe(item.id === answered)
      expect(item.feedback === feedback.get(item.id)).toBe(item.id === answered)
    }
  })

  it('is graded once: a second submit answers the first result', async () => {
    const { id } = await start()
    const first = await submit(id, {})
    expect(await submit(id, await rightAnswers(db, 'nora', id), 11)).toEqual(first)
    expect(first.passed).toBe(false)
    expect(await submit(id, {}, 90)).toEqual(first)
  })

  it('ends 60 minutes after its start: on that instant nothing is taken', async () => {
    const { id } = await start()
    expect(await refusalOf(submit(id, {}, 60))).toMatchObject({ kind: 'conflict', code: 'ended' })
    expect((await submit(id, {}, 59)).passed).toBe(false)
  })

  it('is not there for anybody else', async () => {
    const { id } = await start()
    expect(await refusalOf(submit(id, {}, 5, 'olek'))).toMatchObject({ kind: 'notFound' })
    expect(await refusalOf(readAttempt(await workAfter(db, 'olek'), id, 'en'))).toMatchObject({ kind: 'notFound' })
  })

  it('is not spent by a number that can be read in two ways, or by an answer of another kind', async () => {
    const bank = teaching.get(slug)!.bank
    const attempt = { id: 'a1', personId: 'nora', module: slug, language: 'en', seed: 's', served: JSON.stringify({ passMark: 0.8, items: bank.items.map(item => ({ item, options: [] })) }), startedAt: '2026-12-01T13:30:00.000Z', endsAt: '2026-12-01T14:30:00.000Z' }
    await db('attempts').insert(attempt)
    const number = bank.items.find(item => item.kind === 'number')!.id
    const one = bank.items.find(item => item.kind === 'one')!.id
    expect(await refusalOf(submit('a1', { [number]: '1,234' }))).toMatchObject({ kind: 'unprocessable', code: 'ambiguousNumber', fields: { [`answers.${number}`]: expect.any(String) } })
    expect(await refusalOf(submit('a1', { [number]: { value: 11, unit: 'kPa' } }))).toMatchObject({ kind: 'unprocessable', code: 'wrongUnit' })
    expect(await refusalOf(submit('a1', { [number]: 'eleven' }))).toMatchObject({ kind: 'malformed' })
    expect(await refusalOf(submit('a1', { [one]: ['a'] }))).toMatchObject({ kind: 'malformed', fields: { [`answers.${one}`]: expect.any(String) } })
    expect(await db('attempts').where({ id: 'a1' }).first('submittedAt')).toEqual({ submittedAt: null })
  })

  it('keeps what was served when the bank changes afterwards', async () => {
    const { id } = await start()
    const right = await rightAnswers(db, 'nora', id)
    const taught = teaching.get(slug)!
    const changed = new Map(teaching).set(slug, { ...taught, bank: { ...taught.bank, passMark: 1, items: taught.bank.items.filter(item => item.kind !== 'one') } })
    const result = await submitAttempt(await workAfter(db, 'nora', 5), changed, { id, answers: right, language: 'en' })
    expect(result).toMatchObject({ score: 1, passMark: 0.8, passed: true })
  })
})

describe('two fails in a row', () => {
  it('pause the quiz until the missed lessons are read again and 20 minutes are over', async () => {
    await fail(0)
    await fail(20)
    const paused = await refusalOf(start(31))
    expect(paused).toMatchObject({ kind: 'conflict', code: 'paused', data: { opensAt: '2026-12-01T14:20:00Z' } })
    const lessons = paused.data!.lessons as string[]
    expect(lessons.length).toBeGreaterThan(0)
    expect(await refusalOf(start(120))).toMatchObject({ code: 'paused' })
    for (const lesson of lessons) await markRead(await workAfter(db, 'nora', 35), teaching, { slug, lesson, language: 'en' })
    expect(await refusalOf(start(49))).toMatchObject({ code: 'paused', data: { lessons: [] } })
    expect((await start(50)).items.length).toBeGreaterThan(0)
  })

  it('are not two fails when a pass stands between them', async () => {
    await fail(0)
    await pass(20)
    await fail(40)
    expect((await start(60)).items.length).toBeGreaterThan(0)
  })
})

describe('the hands-on', () => {
  it('comes after the quiz and then issues a credential that remembers both', async () => {
    await makeAssessor(db, 'frank', slug)
    await pass()
    expect((await readModule(await workAfter(db, 'nora', 20), teaching, { slug, language: 'en' })).state).toBe('passed')
    const { id: requestId } = await askForSignOff(await workAfter(db, 'nora', 20), teaching, slug)
    const foreman = await workAfter(db, 'frank', 25, 'foreman')
    expect((await listSignOffRequests(foreman, teaching, 'en')).items).toMatchObject([{ id: requestId, personId: 'nora', quizPassed: true }])
    expect((await readSignOffRequest(foreman, teaching, { id: requestId, language: 'es' })).checklist).toHaveLength(steps.length)
    const signed = await sign('frank', 'foreman')
    expect(signed.passed).toBe(true)
    const row = await db('credentials').where({ id: signed.credentialId }).first()
    expect(row).toMatchObject({ personId: 'nora', issuedOn: '2026-12-01', expiresOn: '2028-12-01', verification: 'verified', verifiedBy: 'frank', signOffId: signed.id })
    expect(row.attemptId).toBeTruthy()
    expect(row.cardCode).toMatch(/^[0-9A-HJKMNP-TV-Z]{18}$/)
    expect((await listSignOffRequests(foreman, teaching, 'en')).items).toEqual([])
    const after = await readModule(await workAfter(db, 'nora', 40), teaching, { slug, language: 'en' })
    expect(after).toMatchObject({ state: 'laid', credential: { id: signed.credentialId, state: 'inDate' } })
    expect(await checkAuditChain(db)).toMatchObject({ intact: true, rows: 2 })
  })

  it('may come before the quiz; then the pass issues the credential', async () => {
    const signed = await sign('sara', 'safety')
    expect(signed).toEqual({ id: expect.any(String), passed: true })
    const result = await pass(60)
    expect(result.credentialId).toBeTruthy()
    expect((await readAttempt(await workAfter(db, 'nora', 90), (await db('attempts').first('id')).id, 'es')).result?.credentialId).toBe(result.credentialId)
  })

  it('issues one credential only, and a second pass none until it is signed off again', async () => {
    await pass()
    await sign('sara', 'safety')
    expect((await pass(60)).credentialId).toBeUndefined()
    expect(await db('credentials').where({ personId: 'nora' })).toHaveLength(1)
    const renewal = await sign('sara', 'safety', {}, 90)
    expect(renewal.credentialId).toBeTruthy()
  })

  it('that failed issues nothing, is told with its notes, and can be asked for again', async () => {
    await pass()
    await askForSignOff(await workAfter(db, 'nora', 20), teaching, slug)
    const failed = await sign('sara', 'safety', { steps: steps.map((step, index) => index === 0 ? { ...step, ok: false, note: 'Look again' } : step) })
    expect(failed).toEqual({ id: failed.id, passed: false })
    const { handsOn, state } = await readModule(await workAfter(db, 'nora', 40), teaching, { slug, language: 'en' })
    expect(state).toBe('passed')
    expect(handsOn).toMatchObject({ isAsked: false, isPassed: false, last: { passed: false, notMet: [{ id: steps[0]!.id, note: 'Look again' }] } })
    expect((await askForSignOff(await workAfter(db, 'nora', 41), teaching, slug)).id).toBeTruthy()
  })

  it('counts with a quiz passed up to 90 days before, and not on the day after', async () => {
    await pass()
    const day = 24 * 60
    expect((await readModule(await workAfter(db, 'nora', 91 * day), teaching, { slug, language: 'en' })).state).toBe('started')
    expect((await sign('sara', 'safety', {}, 91 * day)).credentialId).toBeUndefined()
    expect((await sign('sara', 'safety', {}, 90 * day)).credentialId).toBeTruthy()
  })

  it('is signed by nobody for themselves', async () => {
    await makeAssessor(db, 'frank', slug)
    expect(await refusalOf(sign('frank', 'foreman', { personId: 'frank' }))).toMatchObject({ kind: 'forbidden', code: 'ownSignOff' })
    expect(await refusalOf(sign('sara', 'safety', { personId: 'sara' }))).toMatchObject({ code: 'ownSignOff' })
  })

  it('is signed only by an assessor of that module who holds it in date', async () => {
    expect(await refusalOf(sign('frank', 'foreman'))).toMatchObject({ kind: 'forbidden', code: 'notAssessor' })
    await makeAssessor(db, 'frank', 'running-bond')
    expect(await refusalOf(sign('frank', 'foreman'))).toMatchObject({ code: 'notAssessor' })
    await makeAssessor(db, 'frank', slug, { expiresOn: '2026-11-30' })
    expect(await refusalOf(sign('frank', 'foreman'))).toMatchObject({ code: 'notAssessor' })
    await db('credentials').where({ id: `c-frank-${slug}` }).update({ expiresOn: '2026-12-01' })
    expect((await sign('frank', 'foreman')).passed).toBe(true)
  })

  it('is signed by an assessor of one site only for people rostered there', async () => {
    await db('sites').insert(['s1', 's2'].map(id => ({ id, code: id, name: id, timeZone: 'America/Denver', createdAt: '2026-01-05T14:00:00.000Z' })))
    await makeAssessor(db, 'frank', slug, { siteId: 's1' })
    const roster = (siteId: string) => ({ id: `r-${siteId}`, personId: 'nora', siteId, startsOn: '2026-12-01', endsOn: '2026-12-01', createdAt: '2026-01-05T14:00:00.000Z' })
    await db('assignments').insert(roster('s2'))
    expect(await refusalOf(sign('frank', 'foreman'))).toMatchObject({ code: 'notAssessor' })
    await db('assignments').insert(roster('s1'))
    expect((await sign('frank', 'foreman')).passed).toBe(true)
  })

  it('needs every step answered once, and a mark of the assessor\'s own', async () => {
    expect(await refusalOf(sign('sara', 'safety', { steps: steps.slice(1) }))).toMatchObject({ kind: 'unprocessable', code: 'stepsMissing', fields: { [`steps.${steps[0]!.id}`]: 'is not answered' } })
    expect(await refusalOf(sign('sara', 'safety', { steps: [...steps, { id: 'other', ok: true }] }))).toMatchObject({ code: 'stepsMissing' })
    expect(await refusalOf(sign('sara', 'safety', { steps: [...steps, steps[0]!] }))).toMatchObject({ code: 'stepsMissing' })
    expect(await refusalOf(sign('sara', 'safety', { mark: { kind: 'witnessed', by: 'olek' } }))).toMatchObject({ code: 'wrongMark' })
    expect(await refusalOf(sign('sara', 'safety', { personId: 'nobody' }))).toMatchObject({ kind: 'notFound' })
    expect(await refusalOf(sign('sara', 'safety', { module: 'steel' }))).toMatchObject({ code: 'notOpen' })
    expect(await db('signOffs')).toEqual([])
  })

  it('is asked for once at a time', async () => {
    const first = await askForSignOff(await workAfter(db, 'nora'), teaching, slug)
    expect(await askForSignOff(await workAfter(db, 'nora', 5), teaching, slug)).toEqual(first)
    expect(await refusalOf(askForSignOff(await workAfter(db, 'nora'), teaching, 'steel'))).toMatchObject({ code: 'notOpen' })
    expect(await refusalOf(askForSignOff(await workAfter(db, 'nora'), teaching, 'welding'))).toMatchObject({ kind: 'notFound' })
  })

  it('shows requests to nobody who may not assess them', async () => {
    const { id } = await askForSignOff(await workAfter(db, 'nora'), teaching, slug)
    const foreman = await workAfter(db, 'frank', 5, 'foreman')
    expect((await listSignOffRequests(foreman, teaching, 'en')).items).toEqual([])
    expect(await refusalOf(readSignOffRequest(foreman, teaching, { id, language: 'en' }))).toMatchObject({ kind: 'notFound' })
  })
})

describe('a credential that ran out', () => {
  it('opens its block again; one in date keeps it laid and can still be renewed', async () => {
    await pass()
    await sign('sara', 'safety')
    expect((await start(60)).items.length).toBeGreaterThan(0)
    await db('credentials').update({ expiresOn: '2026-11-30' })
    const view = await readModule(await workAfter(db, 'nora', 40), teaching, { slug, language: 'en' })
    expect(view).toMatchObject({ state: 'started', credential: { state: 'expired' } })
  })
})
