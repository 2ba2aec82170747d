import type { Credential, Validity } from '#shared/domain/validity'
import type { Db } from './database'

/** A credential of a taught module, as far as learning needs it. */
export interface ModuleCredential extends Credential {
  module: string
  leadDays: number
  cardCode: string
}

/** The type that a module issues. */
export interface ModuleType {
  id: string
  code: string
  validity: Validity
}

/** Every credential of taught modules that a person holds or held, newest first. */
export async function listModuleCredentials(db: Db, personId: string): Promise<ModuleCredential[]> {
  const rows = await db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId')
    .where({ personId }).whereNotNull('credentialTypes.module').orderBy([{ column: 'issuedOn', order: 'desc' }, { column: 'credentials.createdAt', order: 'desc' }])
    .select('credentials.id', 'credentialTypes.code as type', 'issuedOn', 'expiresOn', 'verification', 'withdrawnOn', 'details', 'credentialTypes.module', 'leadDays', 'cardCode')
  return rows.map(({ details, ...row }) => ({ ...row, judgedOn: details ? (JSON.parse(details) as { judgedOn?: string }).judgedOn ?? null : null }))
}

/** The credential type of a module, or undefined. */
export async function findModuleType(db: Db, module: string): Promise<ModuleType | undefined> {
  const row = await db('credentialTypes').where({ module }).first('id', 'code', 'validityKind', 'months', 'anchor')
  if (!row) return undefined
  const validity: Validity = row.validityKind === 'period' ? { kind: 'period', months: row.months, anchor: row.anchor } : { kind: row.validityKind }
  return { id: row.id, code: row.code, validity }
}

/** Issues a module's credential: verified from the start, because quiz and hands-on are its proof. */
export async function insertModuleCredential(db: Db, credential: {
  id: string
  personId: string
  typeId: string
  issuedOn: string
  expiresOn: string | null
  issuer: string | null
  attemptId: string
  signOffId: string | null
  cardCode: string
  verifiedBy: string | null
  createdBy: string
  now: string
}): Promise<void> {
  const { now, ...row } = credential
  await db('credentials').insert({ ...row, verification: 'verified', verifiedAt: now, createdAt: now })
}
