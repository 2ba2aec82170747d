import { randomUUID } from 'node:crypto'
import { moduleBySlug } from '#shared/domain/curriculum'
import type { Language } from '#shared/domain/states'
import type { QuestionBody, QuestionView } from '#shared/schemas/training'
import { appendAudit } from '../data/audit'
import { getPerson } from '../data/people'
import { answerQuestion, findQuestion, insertQuestion, listQuestions, listTrainers, type NamedQuestion } from '../data/trainer-questions'
import { answeredMail, questionMail } from '../documents/trainer-mail'
import { queueMail } from './mail'
import { badField, notFound, Refusal } from './refusal'
import type { TaughtModule, Teaching } from './teaching'
import type { Work } from './work'

function requireTaught(teaching: Teaching, slug: string): TaughtModule {
  const taught = teaching.get(slug)
  if (!taught) throw notFound('module')
  return taught
}

const mayAnswer = (work: Work, question: NamedQuestion) => question.answeredAt === null && question.personId !== work.actor.personId && (question.trainerId === work.actor.personId || work.actor.role === 'safety')

function toView(work: Work, teaching: Teaching, question: NamedQuestion, language: Language): QuestionView {
  const taught = teaching.get(question.module)
  const { id, personId, person, trainerId, trainer, module, lesson, language: askedIn, askedAt, answer, answerer, answeredAt } = question
  return {
    id, personId, person, trainerId, trainer, module, lesson, language: askedIn, question: question.question, askedAt, answer, answeredAt,
    title: moduleBySlug(module)?.title[language] ?? module,
    lessonTitle: taught?.lessons.find(one => one.slug === lesson)?.title[language] ?? null,
    item: taught?.bank.items.find(one => one.id === question.itemId)?.stem[language] ?? null,
    answeredBy: answerer, isMine: mayAnswer(work, question),
  }
}

/** Whom a learner may ask about a module: its trainers and assessors, then the safety managers. 404 for no such module. */
export async function readTrainers(work: Work, teaching: Teaching, module: string) {
  requireTaught(teaching, module)
  const trainers = await listTrainers(work.db, { module, date: work.today, exceptId: work.actor.personId })
  return { items: trainers.map(({ id, name }) => ({ id, name })) }
}

/** One's own questions and those one is asked; the safety manager sees all of them. */
export async function readQuestions(work: Work, teaching: Teaching, language: Language) {
  const questions = await listQuestions(work.db, work.actor.personId, work.actor.role === 'safety' ? 'all' : 'own')
  return { items: questions.map(question => toView(work, teaching, question, language)) }
}

/**
 * Asks a named trainer about a lesson or an item, and mails them. The question stays with the record. 404 for no such
 * module; 422 for a lesson or item that is not its own, or somebody who is no trainer of it.
 */
export async function askTrainer(work: Work, teaching: Teaching, { body, language }: { body: QuestionBody, language: Language }): Promise<QuestionView> {
  const { db, actor, now } = work
  const taught = requireTaught(teaching, body.module)
  const item = taught.bank.items.find(one => one.id === body.itemId)
  const lesson = body.lesson ?? item?.lesson
  if (body.itemId && !item) throw badField('itemId', 'is no question of this module')
  if (lesson && !taught.lessons.some(one => one.slug === lesson)) throw badField('lesson', 'is no lesson of this module')
  const trainer = (await listTrainers(db, { module: body.module, date: work.today, exceptId: actor.personId })).find(one => one.id === body.trainerId)
  if (!trainer) throw badField('trainerId', 'is no trainer of this module')
  const asked = { id: randomUUID(), personId: actor.personId, trainerId: trainer.id, module: body.module, lesson: lesson ?? null, itemId: body.itemId ?? null, language, question: body.question, askedAt: now, answer: null, answeredBy: null, answeredAt: null }
  await db.transaction(async (trx) => {
    await insertQuestion(trx, asked)
    if (!trainer.email) return
    const mail = questionMail(trainer.language, { asker: actor.name, module: moduleBySlug(body.module)?.title[trainer.language] ?? body.module, question: body.question, link: `${work.settings.linkOrigin}/questions` })
    await queueMail(trx, { key: `question:${asked.id}`, recipient: trainer.email, personId: trainer.id, ...mail, now })
  })
  return toView(work, teaching, (await findQuestion(db, asked.id))!, language)
}

/** Answers a question that one was asked; the learner is mailed. 404 for others' questions, 409 `answered` the second time. */
export async function answerLearner(work: Work, teaching: Teaching, { id, answer, language }: { id: string, answer: string, language: Language }): Promise<QuestionView> {
  const { db, actor, now } = work
  await db.transaction(async (trx) => {
    const question = await findQuestion(trx, id)
    if (!question || (question.answeredAt === null && !mayAnswer(work, question)) || (question.trainerId !== actor.personId && actor.role !== 'safety')) throw notFound('question')
    if (!await answerQuestion(trx, id, { answer, answeredBy: actor.personId, answeredAt: now })) throw new Refusal('conflict', 'answered', { message: 'This question has its answer' })
    await appendAudit(trx, { at: now, actorId: actor.personId, action: 'question.answered', subject: { kind: 'question', id }, after: { module: question.module } })
    const asker = await getPerson(trx, question.personId)
    if (!asker?.email) return
    const mail = answeredMail(asker.language, { trainer: actor.name, question: question.question, answer, link: `${work.settings.linkOrigin}/questions` })
    await queueMail(trx, { key: `answer:${id}`, recipient: asker.email, personId: asker.id, ...mail, now })
  })
  return toView(work, teaching, (await findQuestion(db, id))!, language)
}
