import type { Language } from '#shared/domain/states'
import type { Db } from './database'

/** A question to a named trainer, and its answer. */
export interface TrainerQuestion {
  id: string
  personId: string
  trainerId: string
  module: string
  lesson: string | null
  itemId: string | null
  language: Language
  question: string
  askedAt: string
  answer: string | null
  answeredBy: string | null
  answeredAt: string | null
}

/** A question with the names that a screen shows. */
export type NamedQuestion = TrainerQuestion & { person: string, trainer: string, answerer: string | null }

const named = (db: Db) => db('trainerQuestions as q')
  .join('people as asker', 'asker.id', 'q.personId').join('people as trainer', 'trainer.id', 'q.trainerId').leftJoin('people as answerer', 'answerer.id', 'q.answeredBy')
  .select('q.*', 'asker.name as person', 'trainer.name as trainer', 'answerer.name as answerer')

/** Questions that somebody asked or was asked, the unanswered first, then the newest. With `'all'` everybody's. */
export async function listQuestions(db: Db, personId: string, scope: 'own' | 'all'): Promise<NamedQuestion[]> {
  return named(db).modify(query => scope === 'own' && query.where(one => one.where('q.personId', personId).orWhere('q.trainerId', personId)))
    .orderByRaw('q.answered_at is not null').orderBy('q.askedAt', 'desc').limit(200) as Promise<NamedQuestion[]>
}

/** One question, or undefined. */
export async function findQuestion(db: Db, id: string): Promise<NamedQuestion | undefined> {
  return named(db).where('q.id', id).first() as Promise<NamedQuestion | undefined>
}

/** Asks. */
export async function insertQuestion(db: Db, question: TrainerQuestion): Promise<void> {
  await db('trainerQuestions').insert(question)
}

/** Answers a question, once: false when it has an answer. */
export async function answerQuestion(db: Db, id: string, answered: { answer: string, answeredBy: string, answeredAt: string }): Promise<boolean> {
  return await db('trainerQuestions').where({ id }).whereNull('answeredAt').update(answered) === 1
}

/** Whom a learner may ask about a module on a date: its trainers and assessors named in writing, then the safety managers; by name. */
export async function listTrainers(db: Db, { module, date, exceptId }: { module: string, date: string, exceptId: string }): Promise<{ id: string, name: string, email: string | null, language: Language }[]> {
  const designated = db('designations').whereIn('kind', ['trainer', 'assessor']).where({ subject: module }).where('startsOn', '<=', date)
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date)).select('personId')
  return db('people').where('hiredOn', '<=', date).where(query => query.whereNull('leftOn').orWhere('leftOn', '>', date)).whereNot('id', exceptId)
    .where(query => query.whereIn('id', designated).orWhere('role', 'safety'))
    .orderByRaw('role = \'safety\'').orderBy(['sortName', 'id']).select('id', 'name', 'email', 'language')
}
