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
  /** Who reads it aloud to them, or null. */
  readBy: string | null
  /** Every language it was shown in. */
  languages: Language[]
}

type AttemptRow = Omit<Attempt, 'served' | 'answers' | 'result' | 'passed' | 'languages'> & { served: string, answers: string | null, result: string | null, passed: 0 | 1 | null, languages: string | null }

function toAttempt(row: AttemptRow): Attempt {
  return {
    ...row,
    served: JSON.parse(row.served) as Served,
    answers: row.answers === null ? null : JSON.parse(row.answers) as Attempt['answers'],
    result: row.result === null ? null : JSON.parse(row.result) as StoredResult,
    passed: row.passed === null ? null : row.passed === 1,
    languages: row.languages === null ? [row.language] : JSON.parse(row.languages) as Language[],
  }
}

/** An attempt of one's own or that one reads aloud to its owner, or undefined: other people's are not there. */
export async function findOwnAttempt(db: Db, personId: string, id: string): Promise<Attempt | undefined> {
  const row = await db<AttemptRow>('attempts').where({ id }).where(query => query.where({ personId }).orWhere({ readBy: personId })).first()
  return row && toAttempt(row)
}

/** Records who reads an attempt aloud. */
export async function setReader(db: Db, id: string, readBy: string): Promise<void> {
  await db('attempts').where({ id }).update({ readBy })
}

/** Records the languages that an attempt was shown in. */
export async function setLanguages(db: Db, id: string, languages: readonly Language[]): Promise<void> {
  await db('attempts').where({ id }).update({ languages: JSON.stringify(languages) })
}

/** When a person last failed a module's quiz, or null. */
export async function findLastFailedAt(db: Db, personId: string, module: string): Promise<string | null> {
  const row = await db('attempts').where({ personId, module, passed: false }).orderBy('submittedAt', 'desc').first('submittedAt')
  return row?.submittedAt ?? null
}

/** People whose last two attempts at one of these modules, since an instant, were not passed; by name. */
export async function listFailedTwice(db: Db, { modules, since }: { modules: readonly string[], since: string }): Promise<{ personId: string, person: string, module: string }[]> {
  const rows: { personId: string, person: string, module: string, passed: 0 | 1 }[] = await db('attempts').join('people', 'people.id', 'attempts.personId')
    .whereIn('module', modules).where('submittedAt', '>=', since).orderBy(['people.sortName', 'attempts.personId', 'module', 'submittedAt'])
    .select('attempts.personId', 'people.name as person', 'module', 'passed')
  return rows.filter((row, index) => {
    const [before, next] = [rows[index - 1], rows[index + 1]]
    const isSame = (other?: typeof row) => other?.personId === row.personId && other.module === row.module
    return row.passed === 0 && isSame(before) && before?.passed === 0 && !isSame(next)
  }).map(({ passed: _failed, ...row }) => row)
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

/** How many graded attempts each module has. */
export async function countModuleAttempts(db: Db): Promise<Map<string, number>> {
  const rows: { module: string, count: number }[] = await db('attempts').whereNotNull('submittedAt').groupBy('module').select('module').count('* as count')
  return new Map(rows.map(row => [row.module, Number(row.count)]))
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
export async function insertAttempt(db: Db, attempt: Pick<Attempt, 'id' | 'personId' | 'module' | 'language' | 'seed' | 'served' | 'startedAt' | 'endsAt' | 'readBy'>): Promise<void> {
  await db('attempts').insert({ ...attempt, served: JSON.stringify(attempt.served) })
}

/** Writes the grading of an attempt, once: false when it was graded before. */
export async function gradeAttempt(db: Db, id: string, graded: { submittedAt: string, answers: Record<string, Answer>, result: StoredResult }): Promise<boolean> {
  const { submittedAt, answers, result } = graded
  const changed = await db('attempts').where({ id }).whereNull('submittedAt')
    .update({ submittedAt, answers: JSON.stringify(answers), result: JSON.stringify(result), score: result.score, passed: result.passed })
  return changed === 1
}

/** Writes that a failed attempt passes after all; false when it had not failed. A pass is never taken back. */
export async function turnIntoPass(db: Db, id: string, result: StoredResult): Promise<boolean> {
  return await db('attempts').where({ id, passed: false }).update({ result: JSON.stringify(result), score: result.score, passed: true }) === 1
}

/** Notes which credential an attempt completed. */
export async function setAttemptCredential(db: Db, id: string, result: StoredResult): Promise<void> {
  await db('attempts').where({ id }).update({ result: JSON.stringify(result) })
}
