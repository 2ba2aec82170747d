import type { HandReason, Language, SignInMethod } from '#shared/domain/states'
import type { Mark } from '#shared/schemas/mark'
import type { Visitor } from '#shared/schemas/briefing'
import type { Db } from './database'

/** What a person answered to the talk's check question. */
export interface CheckAnswer { option: string, isRight: boolean }

export interface SignIn {
  id: string
  briefingId: string
  key: string
  personId: string | null
  visitor: Visitor | null
  /** The person's or visitor's name. */
  name: string
  employer: string
  trade: string | null
  method: SignInMethod
  reason: HandReason | null
  mark: Mark
  language: Language
  signedAt: string
  late: boolean
  enteredBy: string | null
  enteredByName: string | null
  answer: CheckAnswer | null
  explainedByName: string | null
  withoutSignal: boolean
  presenceStep: number | null
  removedAt: string | null
}

export type NewSignIn = Omit<SignIn, 'name' | 'employer' | 'trade' | 'enteredByName' | 'explainedByName' | 'removedAt'> & { explainedBy: string | null, createdAt: string }

const query = (db: Db) => db('signIns')
  .leftJoin('people', 'people.id', 'signIns.personId')
  .leftJoin('people as enterers', 'enterers.id', 'signIns.enteredBy')
  .leftJoin('people as explainers', 'explainers.id', 'signIns.explainedBy')
  .select('signIns.*', 'people.name as personName', 'people.employer as personEmployer', 'people.trade as personTrade', 'enterers.name as enteredByName', 'explainers.name as explainedByName')

interface Row extends Omit<SignIn, 'visitor' | 'name' | 'employer' | 'trade' | 'mark' | 'answer' | 'late' | 'withoutSignal'> {
  visitorName: string | null
  visitorCompany: string | null
  visitorHost: string | null
  personName: string | null
  personEmployer: string | null
  personTrade: string | null
  mark: string
  answer: string | null
  late: number
  withoutSignal: number
}

function toSignIn(row: Row): SignIn {
  const visitor = row.visitorName === null ? null : { name: row.visitorName, company: row.visitorCompany ?? '', ...(row.visitorHost && { host: row.visitorHost }) }
  return {
    id: row.id, briefingId: row.briefingId, key: row.key, personId: row.personId, visitor,
    name: visitor?.name ?? row.personName ?? '', employer: visitor?.company ?? row.personEmployer ?? '', trade: row.personTrade,
    method: row.method, reason: row.reason, mark: JSON.parse(row.mark) as Mark, language: row.language, signedAt: row.signedAt, late: row.late === 1,
    enteredBy: row.enteredBy, enteredByName: row.enteredByName, answer: row.answer === null ? null : JSON.parse(row.answer) as CheckAnswer, explainedByName: row.explainedByName,
    withoutSignal: row.withoutSignal === 1, presenceStep: row.presenceStep, removedAt: row.removedAt,
  }
}

/** Everybody on a briefing's list, in the order of signing; those taken off are left out. */
export async function listSignIns(db: Db, briefingId: string): Promise<SignIn[]> {
  const rows: Row[] = await query(db).where({ 'signIns.briefingId': briefingId }).whereNull('signIns.removedAt').orderBy(['signIns.signedAt', 'signIns.id'])
  return rows.map(toSignIn)
}

async function first(db: Db, where: Record<string, string>, isStanding: boolean): Promise<SignIn | null> {
  const asked = query(db).where(where)
  if (isStanding) asked.whereNull('signIns.removedAt')
  const row: Row | undefined = await asked.first()
  return row ? toSignIn(row) : null
}

/** By the client's key, also one that was taken off. */
export const getSignInByKey = (db: Db, key: string) => first(db, { 'signIns.key': key }, false)
/** A person's standing sign-in on a briefing. */
export const getSignInOfPerson = (db: Db, briefingId: string, personId: string) => first(db, { 'signIns.briefingId': briefingId, 'signIns.personId': personId }, true)
/** One standing line of a briefing. */
export const getSignIn = (db: Db, briefingId: string, id: string) => first(db, { 'signIns.briefingId': briefingId, 'signIns.id': id }, true)

/** Writes a sign-in. Throws when its key is taken or the person stands on the list already. */
export async function insertSignIn(db: Db, signIn: NewSignIn): Promise<void> {
  const { visitor, mark, answer, ...rest } = signIn
  await db('signIns').insert({ ...rest, mark: JSON.stringify(mark), answer: answer && JSON.stringify(answer), visitorName: visitor?.name ?? null, visitorCompany: visitor?.company ?? null, visitorHost: visitor?.host ?? null })
}

/** Takes a line off the list; the row stays as a trace. */
export async function removeSignIn(db: Db, id: string, removedAt: string, removedBy: string): Promise<void> {
  await db('signIns').where({ id }).update({ removedAt, removedBy })
}

/** How many stand on the list. */
export async function countSignIns(db: Db, briefingId: string): Promise<number> {
  const row = await db('signIns').where({ briefingId }).whereNull('removedAt').count({ count: '*' }).first()
  return Number(row?.count ?? 0)
}

/** Who of the company a person id names, for signing in; null when there is nobody. */
export async function getSigner(db: Db, personId: string): Promise<{ id: string, name: string, language: Language, hiredOn: string, leftOn: string | null } | null> {
  return await db('people').where({ id: personId }).first('id', 'name', 'language', 'hiredOn', 'leftOn') ?? null
}

/** Which of these briefings the person stands on. */
export async function listSignedBriefingIds(db: Db, personId: string, briefingIds: readonly string[]): Promise<Set<string>> {
  return new Set(await db('signIns').where({ personId }).whereIn('briefingId', briefingIds).whereNull('removedAt').pluck('briefingId'))
}
