import type { Mark } from '#shared/schemas/mark'
import type { Db } from './database'

/** One step of a hands-on. */
export interface SignedStep { id: string, ok: boolean, note?: string }

/** A hands-on check as it was signed. */
export interface SignOff {
  id: string
  personId: string
  assessorId: string
  module: string
  steps: SignedStep[]
  mark: Mark
  passed: boolean
  signedAt: string
}

/** An open wish for a hands-on, with the name of who asks. */
export interface OpenRequest {
  id: string
  personId: string
  person: string
  module: string
  requestedAt: string
}

/** Writes a signed hands-on. */
export async function insertSignOff(db: Db, signOff: SignOff): Promise<void> {
  await db('signOffs').insert({ ...signOff, steps: JSON.stringify(signOff.steps), mark: JSON.stringify(signOff.mark) })
}

/** The last hands-on of a person and module with the assessor's name, or undefined. */
export async function findLastSignOff(db: Db, personId: string, module: string): Promise<(Omit<SignOff, 'mark'> & { assessor: string }) | undefined> {
  const row = await db('signOffs').join('people', 'people.id', 'signOffs.assessorId').where({ personId, module })
    .orderBy('signedAt', 'desc').first('signOffs.id', 'personId', 'assessorId', 'module', 'steps', 'passed', 'signedAt', 'people.name as assessor')
  return row && { ...row, steps: JSON.parse(row.steps) as SignedStep[], passed: row.passed === 1 }
}

/** Hands-ons of a person and module that no credential was issued from, in the order signed. */
export async function listUnusedSignOffs(db: Db, personId: string, module: string): Promise<{ id: string, assessorId: string, passed: boolean, signedAt: string }[]> {
  const rows = await db('signOffs').where({ personId, module })
    .whereNotExists(db('credentials').whereRaw('credentials.sign_off_id = sign_offs.id').select(db.raw('1')))
    .orderBy('signedAt').select('id', 'assessorId', 'passed', 'signedAt')
  return rows.map(row => ({ ...row, passed: row.passed === 1 }))
}

const openRequests = (db: Db) => db('signOffRequests').join('people', 'people.id', 'signOffRequests.personId').whereNull('closedAt')
  .select('signOffRequests.id', 'personId', 'people.name as person', 'module', 'requestedAt')

/** Every open request for these modules, oldest first. */
export async function listOpenRequests(db: Db, modules: readonly string[]): Promise<OpenRequest[]> {
  return openRequests(db).whereIn('module', modules).orderBy('requestedAt')
}

/** One open request, or undefined. */
export async function findOpenRequest(db: Db, match: { id: string } | { personId: string, module: string }): Promise<OpenRequest | undefined> {
  const row: OpenRequest | undefined = 'id' in match
    ? await openRequests(db).where('signOffRequests.id', match.id).first()
    : await openRequests(db).where(match).first()
  return row
}

/** Asks for a hands-on; at most one open request per person and module. */
export async function insertRequest(db: Db, request: { id: string, personId: string, module: string, requestedAt: string }): Promise<void> {
  await db('signOffRequests').insert(request)
}

/** Closes the open request of a person and module, if there is one. */
export async function closeRequest(db: Db, personId: string, module: string, now: string): Promise<void> {
  await db('signOffRequests').where({ personId, module }).whereNull('closedAt').update({ closedAt: now })
}
