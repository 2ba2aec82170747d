import { randomUUID } from 'node:crypto'
import { addMinutes, compareInstants, epochSecondsOf } from '#shared/domain/dates'
import { drawAttempt } from '#shared/domain/drawing-of-items'
import { attemptResult, passWithout, toServedItem } from '#shared/domain/grading'
import type { Answer } from '#shared/domain/quiz-bank'
import { quizOpening, type QuizOpening } from '#shared/domain/quiz-opening'
import type { Language } from '#shared/domain/states'
import type { AttemptResultView, AttemptView, StartedAttempt, SubmissionBody } from '#shared/schemas/learning'
import { findLastAssessorTalk } from '../data/assessor-talks'
import { findLearner } from '../data/assessors'
import { findOwnAttempt, findRunningAttempt, gradeAttempt, insertAttempt, listGradedAttempts, setAttemptCredential, setLanguages, setReader, type Attempt, type Served } from '../data/attempts'
import type { Db } from '../data/database'
import { closeRequest } from '../data/sign-offs'
import { listStruckIds } from '../data/struck-items'
import { isAnswered, refuseUnreadable, rightOf } from './answers'
import { randomToken } from './hashing'
import { requireAssessable } from './assessing'
import { issueWhenComplete } from './issuing'
import { progressOf } from './learning-progress'
import { notFound, Refusal } from './refusal'
import type { TaughtModule, Teaching } from './teaching'
import { countQuiz, requireTrainingHours } from './training-minutes'
import type { Work } from './work'

/** How long an attempt runs. */
export const ATTEMPT_MINUTES = 60

/** Said instead of the feedback where nothing was answered: feedback often names the right answer. */
const notAnswered = { en: 'Not answered. Read the lesson again.', es: 'Sin responder. Lea otra vez la lección.' }

const missedLessons = (attempt: Pick<Attempt, 'served' | 'result'>) => {
  const shares = new Map(attempt.result?.items.map(grade => [grade.id, grade.share]))
  return attempt.served.items.filter(({ item }) => (shares.get(item.id) ?? 0) < 1).map(({ item }) => item.lesson)
}

/** Whether a person's quiz can be taken now: two fails in a row pause it. An attempt left unsent counts as neither. */
export async function openingOf(db: Db, { personId, module, reads, now }: { personId: string, module: TaughtModule, reads: ReadonlyMap<string, string>, now: string }): Promise<QuizOpening> {
  const attempts = await listGradedAttempts(db, personId, module.slug)
  return quizOpening({
    attempts: attempts.map(attempt => ({ submittedAt: attempt.submittedAt, passed: attempt.passed, missedLessons: missedLessons(attempt) })),
    lastReadAt: new Map(module.lessons.flatMap(({ slug }) => {
      const readAt = reads.get(`${module.slug}/${slug}`)
      return readAt ? [[slug, readAt]] : []
    })),
    assessorAt: await findLastAssessorTalk(db, personId, module.slug),
    pauseMinutes: module.bank.pauseMinutes,
    now,
  })
}

const toStarted = ({ id, endsAt, served }: Pick<Attempt, 'id' | 'endsAt' | 'served'>, language: Language): StartedAttempt => ({
  id, endsAt, items: served.items.map(({ item, options }) => ({ ...toServedItem(item, language, options) }) as StartedAttempt['items'][number]),
})

async function draw(trx: Db, work: Work, { taught, language, personId }: { taught: TaughtModule, language: Language, personId: string }): Promise<Attempt> {
  const seed = randomToken(16)
  const items = new Map(taught.bank.items.map(item => [item.id, item]))
  const served: Served = {
    passMark: taught.bank.passMark,
    items: drawAttempt(taught.bank, seed, await listStruckIds(trx, taught.slug)).flatMap(({ id, options }) => {
      const item = items.get(id)
      return item ? [{ item, options }] : []
    }),
  }
  const readBy = personId === work.actor.personId ? null : work.actor.personId
  const attempt = { id: randomUUID(), personId, module: taught.slug, language, seed, served, startedAt: work.now, endsAt: addMinutes(work.now, ATTEMPT_MINUTES), readBy }
  await insertAttempt(trx, attempt)
  return { ...attempt, submittedAt: null, answers: null, result: null, score: null, passed: null, languages: [language] }
}

/**
 * Draws an attempt, or answers the one that is running, so that a reload loses nothing. Lessons need not be read
 * first (test-out), and a laid block can be taken again to renew it. With `personId` an assessor reads the quiz to
 * somebody: it is that person's attempt, recorded as read by the assessor. 404 for no such module; 409
 * `trainingClosed` outside the company's hours; 409 `notOpen` while the block waits or is not written; 409 `paused`
 * after two fails in a row.
 */
export async function startAttempt(work: Work, teaching: Teaching, { slug, language, personId = work.actor.personId }: { slug: string, language: Language, personId?: string }): Promise<StartedAttempt> {
  const { db, actor, now } = work
  if (personId !== actor.personId) await requireAssessable(db, work, teaching, { personId, module: slug })
  return db.transaction(async (trx) => {
    const progress = await progressOf(trx, work, teaching, personId)
    const state = progress.states.get(slug)
    if (state === undefined) throw notFound('module')
    const taught = teaching.get(slug)
    if (!taught || state === 'waiting' || state === 'unwritten') throw new Refusal('conflict', 'notOpen', { message: 'This block can\'t be laid yet', data: { state } })
    const running = await findRunningAttempt(trx, personId, slug, now)
    if (running) {
      if (personId !== actor.personId) await setReader(trx, running.id, actor.personId)
      return toStarted(running, language)
    }
    requireTrainingHours(work)
    const opening = await openingOf(trx, { personId, module: taught, reads: progress.reads, now })
    if (!opening.isOpen) throw new Refusal('conflict', 'paused', { message: 'Read the missed lessons first', data: { opensAt: opening.opensAt, lessons: opening.lessonsToRead } })
    return toStarted(await draw(trx, work, { taught, language, personId }), language)
  })
}

/** What its owner may see of a graded attempt. */
function toResult(attempt: Attempt, language: Language): AttemptResultView | undefined {
  const { result, answers, served } = attempt
  if (!result) return undefined
  const items = new Map(served.items.map(({ item }) => [item.id, item]))
  return {
    score: result.score, passMark: served.passMark, passed: result.passed, mustKnowMissed: result.mustKnowMissed,
    items: result.items.flatMap(({ id, share }) => {
      const item = items.get(id)
      if (!item) return []
      const hasAnswer = isAnswered(answers?.[id])
      return [{ id, share, lesson: item.lesson, feedback: (hasAnswer ? item.feedback : notAnswered)[language], ...(hasAnswer && { right: rightOf(item) }), ...(result.struck?.includes(id) && { isStruck: true }) }]
    }),
    ...(result.credentialId && { credentialId: result.credentialId }),
  }
}

/** One's own attempt, or one that the actor reads to somebody, to go on with or to look back at; others' are not there. */
export async function readAttempt(work: Work, id: string, language: Language): Promise<AttemptView> {
  const attempt = await findOwnAttempt(work.db, work.actor.personId, id)
  if (!attempt) throw notFound('attempt')
  const { module, startedAt, submittedAt, answers, personId, readBy } = attempt
  const secondsLeft = Math.max(0, epochSecondsOf(attempt.endsAt) - epochSecondsOf(work.now))
  const result = toResult(attempt, language)
  const nameOf = async (who: string) => (await findLearner(work.db, who, work.today))?.name ?? ''
  return {
    ...toStarted(attempt, language), module, startedAt, submittedAt, isOver: compareInstants(work.now, attempt.endsAt) >= 0, secondsLeft,
    ...(readBy && { readBy: await nameOf(readBy) }), ...(personId !== work.actor.personId && { person: { id: personId, name: await nameOf(personId) } }),
    ...(result && { result, answers: answers ?? {} }),
  }
}

/**
 * Grades an attempt, once: a second submit answers the first result. The languages it was started and sent in are kept. 404 for others' attempts, 409 `ended` from
 * its end on. A number that can't be read is refused and nothing is graded. A pass issues the credential when
 * nothing else is missing. An item struck since the start is taken out where that makes a fail a pass.
 */
export async function submitAttempt(work: Work, teaching: Teaching, { id, answers, language }: SubmissionBody & { id: string, language: Language }): Promise<AttemptResultView> {
  const { db, actor, now } = work
  return db.transaction(async (trx) => {
    const attempt = await findOwnAttempt(trx, actor.personId, id)
    if (!attempt) throw notFound('attempt')
    const first = toResult(attempt, language)
    if (first) return first
    if (compareInstants(now, attempt.endsAt) >= 0) throw new Refusal('conflict', 'ended', { message: 'The time ran out', data: { endsAt: attempt.endsAt } })
    const items = attempt.served.items.map(({ item }) => item)
    const given = new Map<string, Answer>(items.flatMap(item => isAnswered(answers[item.id]) ? [[item.id, answers[item.id] as Answer]] : []))
    const graded = attemptResult({ items, answers: given, passMark: attempt.served.passMark })
    refuseUnreadable(items, given, graded.items)
    const result = { ...passWithout(graded, await listStruckIds(trx, attempt.module), { items, passMark: attempt.served.passMark }), credentialId: null }
    await gradeAttempt(trx, id, { submittedAt: now, answers: Object.fromEntries(given), result })
    if (!attempt.languages.includes(language)) await setLanguages(trx, id, [...attempt.languages, language])
    await countQuiz(trx, work, { personId: attempt.personId, module: attempt.module, startedAt: attempt.startedAt, most: ATTEMPT_MINUTES })
    const completed = { ...attempt, submittedAt: now, answers: Object.fromEntries(given), result: { ...result, credentialId: await issueAfterPass(trx, work, teaching, attempt, result.passed) } }
    if (completed.result.credentialId) await setAttemptCredential(trx, id, completed.result)
    return toResult(completed, language)!
  })
}

async function issueAfterPass(trx: Db, work: Work, teaching: Teaching, { personId, module: slug }: Attempt, passed: boolean): Promise<string | null> {
  const module = teaching.get(slug)
  if (!passed || !module) return null
  const credentialId = await issueWhenComplete(trx, work, { personId, module })
  if (credentialId) await closeRequest(trx, personId, slug, work.now)
  return credentialId
}
