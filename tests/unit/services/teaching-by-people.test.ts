import type { Readable } from 'node:stream'
import { text } from 'node:stream/consumers'
import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '~~/server/data/database'
import { listPausedQuizzes, listReadable, recordAssessorTalk } from '~~/server/services/assessor-talks'
import { changeCompany } from '~~/server/services/company'
import { markRead, readLesson, readModule } from '~~/server/services/modules'
import { readAttempt, startAttempt, submitAttempt } from '~~/server/services/quiz'
import { Refusal } from '~~/server/services/refusal'
import { signOff } from '~~/server/services/sign-offs'
import { answerLearner, askTrainer, readQuestions, readTrainers } from '~~/server/services/trainer-questions'
import { exportTrainingMinutes, readOwnMinutes, readTrainingMinutes } from '~~/server/services/training-minutes'
import { makeAssessor, openLearningCompany, rightAnswers, workAfter } from '../../support/learning-company'
import { readRealTeaching } from '../../support/teaching'

const teaching = new Map([...readRealTeaching()].filter(([slug]) => slug === 'stacking' || slug === 'running-bond'))
const slug = 'stacking'
const taught = teaching.get(slug)!

let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
  await makeAssessor(db, 'frank', slug)
})

async function refusalOf(promise: Promise<unknown>) {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return { kind: error.kind, code: error.code, data: error.details.data, fields: error.details.fields }
}
const nora = (minutes = 0) => workAfter(db, 'nora', minutes)
const frank = (minutes = 0) => workAfter(db, 'frank', minutes, 'foreman')

async function failTwice() {
  for (const minutes of [0, 15]) {
    const { id } = await startAttempt(await nora(minutes), teaching, { slug, language: 'en' })
    await submitAttempt(await nora(minutes + 10), teaching, { id, answers: {}, language: 'en' })
  }
}

describe('five minutes with an assessor', () => {
  it('open a paused quiz at once, and count as working time', async () => {
    await failTwice()
    expect((await refusalOf(startAttempt(await nora(26), teaching, { slug, language: 'en' }))).code).toBe('paused')
    const { items } = await listPausedQuizzes(await frank(26), teaching, 'en')
    expect(items).toMatchObject([{ personId: 'nora', module: slug }])
    expect(items[0]!.missed.length).toBeGreaterThan(0)
    await recordAssessorTalk(await frank(31), teaching, { personId: 'nora', module: slug, note: 'the string line' })
    expect((await startAttempt(await nora(31), teaching, { slug, language: 'en' })).items.length).toBeGreaterThan(0)
    expect((await listPausedQuizzes(await frank(31), teaching, 'en')).items).toEqual([])
    expect((await readTrainingMinutes(await workAfter(db, 'sara', 40, 'safety'), { from: '2026-12-01', to: '2026-12-01' })).people[0]!.lines).toContainEqual({ doneOn: '2026-12-01', module: slug, title: 'Stacking', kind: 'assessorTalk', minutes: 5 })
  })

  it('are refused where nothing is paused, from who is no assessor, and for oneself', async () => {
    expect(await refusalOf(recordAssessorTalk(await frank(), teaching, { personId: 'nora', module: slug }))).toMatchObject({ kind: 'conflict', code: 'notPaused' })
    await failTwice()
    expect(await refusalOf(recordAssessorTalk(await workAfter(db, 'olek', 30, 'foreman'), teaching, { personId: 'nora', module: slug }))).toMatchObject({ kind: 'forbidden', code: 'notAssessor' })
    expect(await refusalOf(recordAssessorTalk(await frank(30), teaching, { personId: 'frank', module: slug }))).toMatchObject({ kind: 'forbidden', code: 'ownSignOff' })
    expect(await refusalOf(recordAssessorTalk(await frank(30), teaching, { personId: 'nobody', module: slug }))).toMatchObject({ kind: 'notFound' })
    expect(await refusalOf(recordAssessorTalk(await frank(30), teaching, { personId: 'nora', module: 'welding' }))).toMatchObject({ kind: 'notFound' })
  })

  it('pause again after the next fail', async () => {
    await failTwice()
    await recordAssessorTalk(await frank(31), teaching, { personId: 'nora', module: slug })
    const { id } = await startAttempt(await nora(32), teaching, { slug, language: 'en' })
    await submitAttempt(await nora(40), teaching, { id, answers: {}, language: 'en' })
    expect((await refusalOf(startAttempt(await nora(41), teaching, { slug, language: 'en' }))).code).toBe('paused')
  })
})

describe('a quiz read aloud', () => {
  it('is the learner\'s own attempt, recorded as read by the assessor', async () => {
    expect(await listReadable(await frank(), teaching, 'en')).toMatchObject({ people: expect.arrayContaining([{ id: 'nora', name: 'Person nora', language: 'en' }]), modules: [{ slug }] })
    const { id } = await startAttempt(await frank(), teaching, { slug, language: 'es', personId: 'nora' })
    expect(await readAttempt(await frank(1), id, 'es')).toMatchObject({ person: { id: 'nora', name: 'Person nora' }, readBy: 'Person frank' })
    const result = await submitAttempt(await frank(12), teaching, { id, answers: await rightAnswers(db, 'nora', id), language: 'es' })
    expect(result.passed).toBe(true)
    expect(await db('attempts').where({ id }).first('personId', 'readBy', 'language')).toEqual({ personId: 'nora', readBy: 'frank', language: 'es' })
    expect((await readModule(await nora(13), teaching, { slug, language: 'en' })).state).toBe('passed')
    expect((await readModule(await frank(13), teaching, { slug, language: 'en' })).quiz?.last).toBeUndefined()
  })

  it('goes on with the attempt that the learner had begun', async () => {
    const own = await startAttempt(await nora(), teaching, { slug, language: 'en' })
    expect((await startAttempt(await frank(5), teaching, { slug, language: 'en', personId: 'nora' })).id).toBe(own.id)
    expect(await readAttempt(await nora(6), own.id, 'en')).toMatchObject({ readBy: 'Person frank' })
  })

  it('is nobody else\'s to read', async () => {
    expect(await refusalOf(startAttempt(await workAfter(db, 'olek'), teaching, { slug, language: 'en', personId: 'nora' }))).toMatchObject({ kind: 'forbidden', code: 'notAssessor' })
    const { id } = await startAttempt(await frank(), teaching, { slug, language: 'en', personId: 'nora' })
    expect(await refusalOf(readAttempt(await workAfter(db, 'olek', 1), id, 'en'))).toMatchObject({ kind: 'notFound' })
  })

  it('remembers both languages when it was begun in one and sent in the other', async () => {
    const { id } = await startAttempt(await nora(), teaching, { slug, language: 'es' })
    await submitAttempt(await nora(5), teaching, { id, answers: {}, language: 'en' })
    expect(JSON.parse((await db('attempts').where({ id }).first('languages')).languages)).toEqual(['es', 'en'])
  })
})

describe('a question to a trainer', () => {
  const ask = async (body: Partial<Parameters<typeof askTrainer>[2]['body']> = {}) => askTrainer(await nora(3), teaching, { body: { trainerId: 'frank', module: slug, lesson: taught.lessons[0]!.slug, question: 'How far down?', ...body }, language: 'en' })

  it('reaches the trainer, and the answer comes back and is kept', async () => {
    await db('people').where({ id: 'frank' }).update({ email: 'frank@test.example' })
    expect((await readTrainers(await nora(), teaching, slug)).items.map(trainer => trainer.id)).toEqual(['frank', 'sara'])
    const { id } = await ask()
    expect((await db('mail').first('recipient', 'body')).body).toContain('How far down?')
    expect((await readQuestions(await frank(4), teaching, 'en')).items).toMatchObject([{ id, isMine: true, person: 'Person nora' }])
    await answerLearner(await frank(5), teaching, { id, answer: 'Until it clicks.', language: 'en' })
    expect((await readQuestions(await nora(6), teaching, 'en')).items).toMatchObject([{ id, isMine: false, answer: 'Until it clicks.', answeredBy: 'Person frank' }])
    expect(await refusalOf(answerLearner(await frank(7), teaching, { id, answer: 'No.', language: 'en' }))).toMatchObject({ kind: 'conflict', code: 'answered' })
  })

  it('is seen by the one who asked, the trainer and the safety manager alone', async () => {
    const { id } = await ask()
    expect((await readQuestions(await workAfter(db, 'olek', 4), teaching, 'en')).items).toEqual([])
    expect(await refusalOf(answerLearner(await workAfter(db, 'olek', 4), teaching, { id, answer: 'x', language: 'en' }))).toMatchObject({ kind: 'notFound' })
    expect(await refusalOf(answerLearner(await nora(4), teaching, { id, answer: 'x', language: 'en' }))).toMatchObject({ kind: 'notFound' })
    expect((await readQuestions(await workAfter(db, 'sara', 4, 'safety'), teaching, 'es')).items).toMatchObject([{ id, isMine: true, title: 'Apilar bloques' }])
  })

  it('names the item it is about without its key, and is refused for what is not there', async () => {
    const item = taught.bank.items[0]!
    expect(await ask({ lesson: undefined, itemId: item.id })).toMatchObject({ item: item.stem.en, lesson: item.lesson })
    expect((await refusalOf(ask({ itemId: 'none-01' }))).fields).toHaveProperty('itemId')
    expect((await refusalOf(ask({ lesson: 'no-lesson' }))).fields).toHaveProperty('lesson')
    expect((await refusalOf(ask({ trainerId: 'olek' }))).fields).toHaveProperty('trainerId')
  })
})

describe('minutes of required training', () => {
  const lesson = taught.lessons[0]!
  const total = async (minutes: number) => (await readOwnMinutes(await nora(minutes), '2026-11-30')).total
  const read = async (minutes: number) => markRead(await nora(minutes), teaching, { slug, lesson: lesson.slug, language: 'en' })

  it('count a lesson once, and again after a quiz that was not passed', async () => {
    await read(0)
    await read(5)
    expect(await total(5)).toBe(lesson.minutes)
    const { id } = await startAttempt(await nora(10), teaching, { slug, language: 'en' })
    await submitAttempt(await nora(19), teaching, { id, answers: {}, language: 'en' })
    await read(20)
    await read(21)
    expect(await total(30)).toBe(2 * lesson.minutes + 9)
  })

  it('count a hands-on by its steps', async () => {
    await signOff(await frank(), teaching, { personId: 'nora', module: slug, steps: taught.text.en.checklist.map(({ id }) => ({ id, ok: true })), mark: { kind: 'tap' } })
    expect(await total(1)).toBe(taught.text.en.checklist.length * 3)
  })

  it('are exported by person, day and kind, and a name is never a formula', async () => {
    await db('people').where({ id: 'nora' }).update({ name: '=cmd()' })
    await read(0)
    const sara = await workAfter(db, 'sara', 10, 'safety')
    const { body, fileName } = await exportTrainingMinutes(sara, { from: '2026-12-01', to: '2026-12-31', format: 'csv' })
    expect(fileName).toBe('training-minutes-2026-12-01-2026-12-31.csv')
    expect((await text(body as Readable)).split('\r\n')[1]).toBe(`'=cmd(),nora,Test Walls,,2026-12-01,Stacking,lessons read,${lesson.minutes}`)
    expect((await refusalOf(exportTrainingMinutes(sara, { from: '2026-12-02', to: '2026-12-01', format: 'csv' }))).code).toBe('wrongPeriod')
    expect((await readTrainingMinutes(sara, { from: '2026-11-01', to: '2026-11-30' })).people).toEqual([])
  })

  it('are not worked outside the hours that the company set', async () => {
    const admin = await workAfter(db, 'sara', 0, 'admin')
    await changeCompany(admin, { trainingHours: { from: '07:00', to: '15:00', days: [1, 2, 3, 4, 5] } })
    const page = { body: null, sources: [] }
    expect(await refusalOf(startAttempt(await nora(29), teaching, { slug, language: 'en' }))).toMatchObject({ kind: 'conflict', code: 'trainingClosed', data: { opensAt: '2026-12-01T14:00:00.000Z' } })
    expect((await refusalOf(readLesson(await nora(29), teaching, { slug, lesson: lesson.slug, language: 'en', page }))).code).toBe('trainingClosed')
    expect((await startAttempt(await nora(30), teaching, { slug, language: 'en' })).items.length).toBeGreaterThan(0)
    await changeCompany(admin, { trainingHours: null })
    expect((await readLesson(await nora(10), teaching, { slug, lesson: lesson.slug, language: 'en', page })).slug).toBe(lesson.slug)
  })
})
