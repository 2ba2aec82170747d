import type { Readable } from 'node:stream'
import { text } from 'node:stream/consumers'
import { parse } from 'csv-parse/sync'
import { readSheet } from 'read-excel-file/node'
import { beforeEach, describe, expect, it } from 'vitest'
import { findOwnAttempt } from '~~/server/data/attempts'
import { checkAuditChain } from '~~/server/data/audit'
import type { Db } from '~~/server/data/database'
import { readItem } from '~~/server/services/item-detail'
import { reviewModuleItems } from '~~/server/services/item-review'
import { exportItemReview } from '~~/server/services/item-review-export'
import { restoreItem, strikeItem } from '~~/server/services/item-strikes'
import { readModule } from '~~/server/services/modules'
import { readAttempt, startAttempt, submitAttempt } from '~~/server/services/quiz'
import { Refusal } from '~~/server/services/refusal'
import { signOff } from '~~/server/services/sign-offs'
import { makeAssessor, openLearningCompany, rightAnswers, workAfter } from '../../support/learning-company'
import { readRealTeaching } from '../../support/teaching'

const teaching = new Map([...readRealTeaching()].filter(([slug]) => slug === 'stacking' || slug === 'running-bond'))
const slug = 'stacking'
const taught = teaching.get(slug)!
/** A must-know item, so that every attempt is served it and misses by it alone. */
const must = taught.bank.items.find(item => item.mustKnow && item.kind === 'one')!
const wrongOption = must.kind === 'one' ? must.options.find(option => option.id !== must.key)!.id : ''
const question = { module: slug, takenIn: 'all', language: 'en' } as const
const strike = { itemId: must.id, reason: 'Two answers are right at our sites' }

let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
  await makeAssessor(db, 'frank', slug)
})

async function refusalOf(promise: Promise<unknown>) {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return { kind: error.kind, code: error.code }
}
const sara = (minutes = 500) => workAfter(db, 'sara', minutes, 'safety')

/** Takes the quiz, everything right but the items in `missed`. */
async function take(personId: string, minutes: number, { missed = [must.id], language = 'en' }: { missed?: string[], language?: 'en' | 'es' } = {}) {
  const { id } = await startAttempt(await workAfter(db, personId, minutes), teaching, { slug, language })
  const answers = { ...await rightAnswers(db, personId, id), ...Object.fromEntries(missed.map(item => [item, item === must.id ? wrongOption : []])) }
  return { id, ...await submitAttempt(await workAfter(db, personId, minutes + 10), teaching, { id, answers, language }) }
}
const handsOn = async (personId: string, minutes: number) => signOff(await workAfter(db, 'frank', minutes, 'foreman'), teaching, {
  personId, module: slug, mark: { kind: 'tap' }, steps: taught.text.en.checklist.map(({ id }) => ({ id, ok: true })),
})
const lineOf = async (takenIn: 'all' | 'en' | 'es' = 'all') => (await reviewModuleItems(await sara(), teaching, { ...question, takenIn })).items.find(item => item.id === must.id)!

describe('striking an item', () => {
  it('turns a fail that hung on it into a pass, and keeps what was answered', async () => {
    const failed = await take('nora', 0)
    expect(failed).toMatchObject({ passed: false, mustKnowMissed: [must.id] })
    expect(await strikeItem(await sara(), teaching, strike)).toEqual({ item: must.id, isStruck: true, attempts: 1, people: 1, credentials: 0 })
    const { result, answers } = await readAttempt(await workAfter(db, 'nora', 510), failed.id, 'en')
    expect(result).toMatchObject({ passed: true, score: 1, mustKnowMissed: [] })
    expect(result!.items.find(item => item.id === must.id)).toMatchObject({ share: 0, isStruck: true })
    expect(answers![must.id]).toBe(wrongOption)
    expect((await readModule(await workAfter(db, 'nora', 510), teaching, { slug, language: 'en' })).state).toBe('passed')
    expect(await db('attempts').where({ id: failed.id }).first('score', 'passed')).toEqual({ score: 1, passed: 1 })
  })

  it('issues the credential at once where the hands-on is there', async () => {
    await take('nora', 0)
    await handsOn('nora', 30)
    await take('olek', 0)
    expect(await strikeItem(await sara(), teaching, strike)).toMatchObject({ attempts: 2, people: 2, credentials: 1 })
    expect(await db('credentials').where({ personId: 'nora' }).first('verification', 'issuedOn', 'createdBy', 'verifiedBy')).toEqual({ verification: 'verified', issuedOn: '2026-12-01', createdBy: 'sara', verifiedBy: 'frank' })
    expect((await readModule(await workAfter(db, 'nora', 510), teaching, { slug, language: 'en' })).state).toBe('laid')
    expect(await db('credentials').where({ personId: 'olek' })).toEqual([])
  })

  it('renews nothing through an old fail of somebody who passed later', async () => {
    await take('nora', 0)
    await take('nora', 60, { missed: [] })
    await handsOn('nora', 90)
    await handsOn('nora', 120)
    const held = await db('credentials').where({ personId: 'nora' }).pluck('id')
    expect(held).toHaveLength(1)
    expect(await strikeItem(await sara(), teaching, strike)).toMatchObject({ attempts: 1, people: 1, credentials: 0 })
    expect(await db('credentials').where({ personId: 'nora' }).pluck('id')).toEqual(held)
  })

  it('issues nothing to somebody who has left', async () => {
    await take('nora', 0)
    await handsOn('nora', 30)
    await db('people').where({ id: 'nora' }).update({ leftOn: '2026-11-30' })
    expect(await strikeItem(await sara(), teaching, strike)).toMatchObject({ attempts: 1, credentials: 0 })
  })

  it('leaves passes, other fails and their scores alone', async () => {
    const passed = await take('nora', 0, { missed: [] })
    const others = taught.bank.items.filter(item => item.mustKnow && item.id !== must.id).slice(0, 1).map(item => item.id)
    const failed = await take('olek', 0, { missed: [must.id, ...others] })
    const before = await db('attempts').orderBy('id')
    expect(await strikeItem(await sara(), teaching, strike)).toMatchObject({ attempts: 0, people: 0 })
    expect(await db('attempts').orderBy('id')).toEqual(before)
    expect([passed.passed, failed.passed]).toEqual([true, false])
  })

  it('keeps the item out of every later draw, and counts it out of an attempt that had begun', async () => {
    const { id } = await startAttempt(await workAfter(db, 'nora', 0), teaching, { slug, language: 'en' })
    await strikeItem(await sara(5), teaching, strike)
    const result = await submitAttempt(await workAfter(db, 'nora', 10), teaching, { id, answers: { ...await rightAnswers(db, 'nora', id), [must.id]: wrongOption }, language: 'en' })
    expect(result).toMatchObject({ passed: true, score: 1 })
    for (const personId of ['olek', 'frank', 'sara']) {
      const { items } = await startAttempt(await workAfter(db, personId, 20), teaching, { slug, language: 'en' })
      expect(items.map(item => item.id)).not.toContain(must.id)
      expect(items).toHaveLength(taught.bank.quizLength)
    }
  })

  it('as a preview tells the same and saves nothing', async () => {
    await take('nora', 0)
    await handsOn('nora', 30)
    const tables = ['attempts', 'credentials', 'struckItems', 'audit', 'signOffRequests']
    const before = await Promise.all(tables.map(table => db(table)))
    expect(await strikeItem(await sara(), teaching, { ...strike, preview: true })).toEqual({ item: must.id, isStruck: true, attempts: 1, people: 1, credentials: 1 })
    expect(await Promise.all(tables.map(table => db(table)))).toEqual(before)
  })

  it('is written down with its reason, each regraded attempt too, and the chain holds', async () => {
    await take('nora', 0)
    await strikeItem(await sara(), teaching, strike)
    const rows = await db('audit').join('auditDetails', 'auditDetails.seq', 'audit.seq').orderBy('audit.seq').select('action', 'details')
    expect(rows.map(row => row.action)).toEqual(expect.arrayContaining(['item.struck', 'attempt.regraded']))
    expect(JSON.parse(rows.find(row => row.action === 'item.struck').details).after).toEqual({ module: slug, reason: strike.reason })
    expect(JSON.parse(rows.find(row => row.action === 'attempt.regraded').details)).toMatchObject({ before: { passed: false }, after: { personId: 'nora', passed: true, struck: [must.id] } })
    expect((await checkAuditChain(db)).intact).toBe(true)
  })

  it('is refused for what is no item, twice, and where the rest would not fill a quiz', async () => {
    expect(await refusalOf(strikeItem(await sara(), teaching, { ...strike, itemId: 'no-such-01' }))).toEqual({ kind: 'notFound', code: 'notFound' })
    await strikeItem(await sara(), teaching, strike)
    expect(await refusalOf(strikeItem(await sara(), teaching, strike))).toEqual({ kind: 'conflict', code: 'alreadyStruck' })
    const small = new Map([[slug, { ...taught, bank: { ...taught.bank, items: taught.bank.items.slice(0, taught.bank.quizLength) } }]])
    const other = small.get(slug)!.bank.items.find(item => item.id !== must.id)!
    expect(await refusalOf(strikeItem(await sara(), small, { ...strike, itemId: other.id }))).toEqual({ kind: 'conflict', code: 'tooFewLeft' })
    expect(await db('struckItems').pluck('itemId')).toEqual([must.id])
  })
})

describe('restoring an item', () => {
  it('puts it back into draws and takes no pass away', async () => {
    const { id } = await take('nora', 0)
    await strikeItem(await sara(20), teaching, strike)
    await restoreItem(await sara(30), teaching, { itemId: must.id, reason: 'Reworded' })
    expect((await findOwnAttempt(db, 'nora', id))!.passed).toBe(true)
    expect((await startAttempt(await workAfter(db, 'olek', 40), teaching, { slug, language: 'en' })).items.map(item => item.id)).toContain(must.id)
    const { isStruck, strikes } = await readItem(await sara(50), teaching, { itemId: must.id, takenIn: 'all', language: 'en' })
    expect(isStruck).toBe(false)
    expect(strikes).toMatchObject([{ reason: strike.reason, by: 'Person sara', restored: { reason: 'Reworded', by: 'Person sara' } }])
    expect(await db('audit').pluck('action')).toContain('item.restored')
  })

  it('can be followed by another strike, and both are kept', async () => {
    await strikeItem(await sara(20), teaching, strike)
    await restoreItem(await sara(30), teaching, { itemId: must.id, reason: 'Reworded' })
    await strikeItem(await sara(40), teaching, { ...strike, reason: 'Still not clear' })
    const { strikes } = await readItem(await sara(50), teaching, { itemId: must.id, takenIn: 'all', language: 'en' })
    expect(strikes.map(one => [one.reason, one.restored !== null])).toEqual([['Still not clear', false], [strike.reason, true]])
  })

  it('is refused for an item that is not struck, or none at all', async () => {
    expect(await refusalOf(restoreItem(await sara(), teaching, { itemId: must.id, reason: 'x' }))).toEqual({ kind: 'conflict', code: 'notStruck' })
    expect(await refusalOf(restoreItem(await sara(), teaching, { itemId: 'no-such-01', reason: 'x' }))).toEqual({ kind: 'notFound', code: 'notFound' })
  })
})

describe('the review of a module', () => {
  it('counts people, attempts, scores and the picks of each option', async () => {
    await take('nora', 0)
    await take('olek', 0, { missed: [] })
    const review = await reviewModuleItems(await sara(), teaching, question)
    expect(review).toMatchObject({ people: 2, attempts: 2, passed: 1, passMark: 0.8, isKeyWithheld: false, reliability: expect.stringMatching(/tooFew|unknown/), module: { title: 'Stacking' } })
    expect(review.scores.reduce((sum, band) => sum + band.attempts, 0)).toBe(2)
    const line = await lineOf()
    expect(line).toMatchObject({ served: 2, p: 0.5, flags: [], picks: { [wrongOption]: 1 }, mustKnow: true, stem: must.stem.en, struck: null })
    expect(line.options.find(option => option.isRight)).toEqual({ id: must.kind === 'one' ? must.key : '', picks: 1, isRight: true })
    expect(line.low!).toBeCloseTo(0.0945, 4)
  })

  it('tells the languages apart, and counts an attempt in both among all only', async () => {
    await take('nora', 0)
    await take('olek', 0, { language: 'es', missed: [] })
    const { id } = await startAttempt(await workAfter(db, 'frank', 0), teaching, { slug, language: 'es' })
    await submitAttempt(await workAfter(db, 'frank', 5), teaching, { id, answers: {}, language: 'en' })
    expect([(await lineOf()).served, (await lineOf('en')).served, (await lineOf('es')).served]).toEqual([3, 1, 1])
    expect([(await lineOf('en')).p, (await lineOf('es')).p]).toEqual([0, 1])
  })

  it('keeps an item\'s figures after a strike turned its fails', async () => {
    await take('nora', 0)
    await strikeItem(await sara(20), teaching, strike)
    expect(await lineOf()).toMatchObject({ served: 1, p: 0, picks: { [wrongOption]: 1 }, struck: { reason: strike.reason, by: 'Person sara' } })
  })

  it('shows a manager no key while their own attempt runs', async () => {
    await take('nora', 0)
    const { id } = await startAttempt(await sara(20), teaching, { slug, language: 'en' })
    const review = await reviewModuleItems(await sara(21), teaching, question)
    expect(review.isKeyWithheld).toBe(true)
    expect(review.items.every(item => item.options.length === 0 && Object.keys(item.picks).length === 0)).toBe(true)
    expect(await refusalOf(readItem(await sara(21), teaching, { itemId: must.id, takenIn: 'all', language: 'en' }))).toEqual({ kind: 'conflict', code: 'ownAttemptRuns' })
    expect(await refusalOf(exportItemReview(await sara(21), teaching, { ...question, format: 'csv' }))).toEqual({ kind: 'conflict', code: 'ownAttemptRuns' })
    await submitAttempt(await sara(25), teaching, { id, answers: {}, language: 'en' })
    expect((await reviewModuleItems(await sara(26), teaching, question)).isKeyWithheld).toBe(false)
  })

  it('has no items for a module that is not written, and is not there for no module', async () => {
    expect((await reviewModuleItems(await sara(), teaching, { ...question, module: 'pour-lead' })).items).toEqual([])
    expect(await refusalOf(reviewModuleItems(await sara(), teaching, { ...question, module: 'welding' }))).toEqual({ kind: 'notFound', code: 'notFound' })
  })
})

describe('one item', () => {
  const detail = async (itemId: string) => readItem(await sara(), teaching, { itemId, takenIn: 'all', language: 'es' })

  it('comes with its texts in both languages, its key, lesson and feedback', async () => {
    await take('nora', 0)
    const item = await detail(must.id)
    expect(item).toMatchObject({ stem: must.stem, feedback: must.feedback, source: must.source, module: { slug, title: 'Apilar bloques' }, right: null, given: [], isStruck: false, strikes: [] })
    expect(item.options.filter(option => option.isRight)).toMatchObject([{ id: must.kind === 'one' ? must.key : '', picks: 0 }])
    expect(item.lesson.title).toBe(taught.lessons.find(lesson => lesson.slug === must.lesson)!.title.es)
  })

  it('of an order or a number tells what was answered', async () => {
    for (const kind of ['order', 'number'] as const) {
      const item = taught.bank.items.find(one => one.kind === kind)!
      const served = { passMark: 0.8, items: [{ item, options: [] }] }
      const right = item.kind === 'number' ? { value: item.key.value, unit: item.unit } : item.kind === 'order' ? item.key : []
      const base = { personId: 'nora', module: slug, language: 'en', seed: 's', served: JSON.stringify(served), startedAt: '2026-12-01T13:30:00.000Z', endsAt: '2026-12-01T14:30:00.000Z', submittedAt: '2026-12-01T13:40:00.000Z', score: 1, passed: true }
      await db('attempts').insert([1, 2].map(number => ({ ...base, id: `${kind}-${number}`, answers: JSON.stringify({ [item.id]: right }), result: JSON.stringify({ score: 1, passed: true, mustKnowMissed: [], items: [{ id: item.id, share: 1 }], credentialId: null }) })))
      const { given, right: words } = await detail(item.id)
      expect(given).toEqual([{ answer: words, count: 2, isRight: true }])
    }
  })
})

describe('the exported table', () => {
  it('reads back as CSV with numbers, and a reason is never a formula', async () => {
    await take('nora', 0)
    await strikeItem(await sara(20), teaching, { ...strike, reason: '=HYPERLINK("x")' })
    const { body, fileName, type } = await exportItemReview(await sara(), teaching, { ...question, format: 'csv' })
    expect([fileName, type]).toEqual(['question-review-stacking-2026-12-01.csv', 'text/csv; charset=utf-8'])
    const rows: Record<string, string>[] = parse((await text(body as Readable)), { bom: true, columns: true })
    expect(rows).toHaveLength(taught.bank.items.length)
    expect(rows.find(row => row.Number === must.id)).toMatchObject({ 'Question': must.stem.en, 'Must-know': 'yes', 'Times asked': '1', 'Share right': '0', '95 % from': '0', 'Needs a look': 'asked fewer than 30 times', 'Taken out because': '\'=HYPERLINK("x")' })
    expect(rows.find(row => row.Number === must.id)!.Picked).toContain(`${wrongOption.toUpperCase()} 1`)
  })

  it('reads back as XLSX in Spanish', async () => {
    await take('nora', 0, { language: 'es' })
    const { body, fileName } = await exportItemReview(await sara(), teaching, { module: slug, takenIn: 'es', language: 'es', format: 'xlsx' })
    expect(fileName).toBe('revision-de-preguntas-stacking-es-2026-12-01.xlsx')
    const [header, ...rows] = await readSheet(body as Buffer)
    expect(header?.[1]).toBe('Pregunta')
    expect(rows.find(row => row[0] === must.id)?.slice(1, 8)).toEqual([must.stem.es, 'una', 'sí', taught.lessons.find(lesson => lesson.slug === must.lesson)!.title.es, 1, 0, 0])
  })
})
