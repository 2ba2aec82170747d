import { compareInstants } from '#shared/domain/dates'
import type { AttemptResult } from '#shared/domain/grading'
import type { Answer, BankItem } from '#shared/domain/quiz-bank'
import type { Language } from '#shared/domain/states'
import type { Db } from './database'

/** What an attempt was served, with keys and feedback as they were then: later edits to the bank don't change it. */
export interface Served {
  passMark: number
  items: { item: BankItem, options: string[] }[]
}

/** What is kept of a grading. */
export interface StoredResult extends AttemptResult {
  credentialId: string | null
}

/** One go at a quiz. */
export interface Attempt {
  id: string
  personId: string
  module: string
  language: Language
  seed: string
  served: Served
  startedAt: string
  endsAt: string
  submittedAt: string | null
  answers: Record<string, Answer> | null
  result: StoredResult | null
  score: number | null
  passed: boolean | null
}

type AttemptRow = Omit<Attempt, 'served' | 'answers' | 'result' | 'passed'> & { served: string, answers: string | null, result: string | null, passed: 0 | 1 | null }

function toAttempt(row: AttemptRow): Attempt {
  return {
    ...row,
    served: JSON.parse(row.served) as Served,
    answers: row.answers === null ? null : JSON.parse(row.answers) as Attempt['answers'],
    result: row.result === null ? null : JSON.parse(row.result) as StoredResult,
    passed: row.passed === null ? null : row.passed === 1,
  }
}

/** One person's attempt, or undefined: other people's are not there. */
export async function findOwnAttempt(db: Db, personId: string, id: string): Promise<Attempt | undefined> {
  const row = await db<AttemptRow>('attempts').where({ id, personId }).first()
  return row && toAttempt(row)
}

/** A person's attempt at a module that is neither submitted nor over, or undefined. */
export async function findRunningAttempt(db: Db, personId: string, module: string, now: string): Promise<Attempt | undefined> {
  const row = await db<AttemptRow>('attempts').where({ personId, module }).whereNull('submittedAt').orderBy('startedAt', 'desc').first()
  return row && compareInstants(now, row.endsAt) < 0 ? toAttempt(row) : undefined
}

/** A person's graded attempts at a module, or at all of them, in the order submitted. */
export async function listGradedAttempts(db: Db, personId: string, module?: string): Promise<(Attempt & { submittedAt: string, result: StoredResult, passed: boolean })[]> {
  const rows = await db<AttemptRow>('attempts').where({ personId, ...(module && { module }) }).whereNotNull('submittedAt').orderBy('submittedAt')
  return rows.map(toAttempt) as (Attempt & { submittedAt: string, result: StoredResult, passed: boolean })[]
}

/** Everybody's graded attempts at a module, in the order submitted. */
export async function listModuleAttempts(db: Db, module: string): Promise<Attempt[]> {
  return (await db<AttemptRow>('attempts').where({ module }).whereNotNull('submittedAt').orderBy('submittedAt')).map(toAttempt)
}

/** Passed attempts, of these people, that no credential was issued from; in the order submitted. */
export async function listUnusedPasses(db: Db, personIds: readonly string[], module?: string): Promise<{ id: string, personId: string, module: string, submittedAt: string }[]> {
  return db('attempts').whereIn('personId', personIds).where({ passed: true, ...(module && { module }) })
    .whereNotExists(db('credentials').whereRaw('credentials.attempt_id = attempts.id').select(db.raw('1')))
    .orderBy('submittedAt').select('id', 'personId', 'module', 'submittedAt')
}

/** The modules that a person tried at all. */
export async function listTriedModules(db: Db, personId: string): Promise<string[]> {
  return db('attempts').where({ personId }).distinct().pluck('module')
}

/** Starts an attempt. */
export async function insertAttempt(db: Db, attempt: Pick<Attempt, 'id' | 'personId' | 'module' | 'language' | 'seed' | 'served' | 'startedAt' | 'endsAt'>): Promise<void> {
  await db('attempts').insert({ ...attempt, served: JSON.stringify(attempt.served) })
}

/** Writes the grading of an attempt, once: false when it was graded before. */
export async function gradeAttempt(db: Db, id: string, graded: { submittedAt: string, answers: Record<string, Answer>, result: StoredResult }): Promise<boolean> {
  const { submittedAt, answers, result } = graded
  const changed = await db('attempts').where({ id }).whereNull('submittedAt')
    .update({ submittedAt, answers: JSON.stringify(answers), result: JSON.stringify(result), score: result.score, passed: result.passed })
  return changed === 1
}

/** Notes which credential an attempt completed. */
export async function setAttemptCredential(db: Db, id: string, result: StoredResult): Promise<void> {
  await db('attempts').where({ id }).update({ result: JSON.stringify(result) })
}
