import type { CredentialType, Validity } from '#shared/domain/validity'
import type { Verification } from '#shared/domain/states'
import type { CredentialDetails } from '#shared/schemas/credentials'
import type { Db } from './database'

/** A credential as it is kept. */
export interface StoredCredential {
  id: string
  personId: string
  typeId: string
  issuedOn: string
  expiresOn: string | null
  number: string | null
  issuer: string | null
  siteId: string | null
  details: CredentialDetails | null
  fileId: string | null
  verification: Verification
  verifiedBy: string | null
  verifiedAt: string | null
  verificationNote: string | null
  withdrawnOn: string | null
  withdrawnBy: string | null
  withdrawalReason: string | null
  cardCode: string
  createdBy: string | null
  createdAt: string
  version: number
}

/** A credential type as the rules need it, with its id and names. */
export interface StoredType extends CredentialType {
  id: string
  name: { en: string, es: string }
}

interface TypeRow { id: string, code: string, nameEn: string, nameEs: string, validityKind: Validity['kind'], months: number | null, anchor: 'day' | 'monthEnd' | null, basis: CredentialType['basis'], leadDays: number, perSite: number, module: string | null }

const toValidity = (row: TypeRow): Validity => row.validityKind === 'period' ? { kind: 'period', months: row.months!, anchor: row.anchor! } : { kind: row.validityKind }

const toType = (row: TypeRow): StoredType => ({
  id: row.id, code: row.code, name: { en: row.nameEn, es: row.nameEs }, validity: toValidity(row),
  basis: row.basis, leadDays: row.leadDays, perSite: row.perSite === 1, module: row.module,
})

/** The type with this code, or undefined. */
export async function findCredentialType(db: Db, code: string): Promise<StoredType | undefined> {
  const row = await db<TypeRow>('credentialTypes').where({ code }).first()
  return row && toType(row)
}

/** Every type, by code. */
export async function listStoredTypes(db: Db): Promise<StoredType[]> {
  return (await db<TypeRow>('credentialTypes').orderBy('code').select('*')).map(toType)
}

type CredentialRow = Omit<StoredCredential, 'details'> & { details: string | null }

const toCredential = (row: CredentialRow): StoredCredential => ({ ...row, details: row.details === null ? null : JSON.parse(row.details) as CredentialDetails })

/** The credential with this id, or undefined. */
export async function findCredential(db: Db, id: string): Promise<StoredCredential | undefined> {
  const row = await db<CredentialRow>('credentials').where({ id }).first()
  return row && toCredential(row)
}

/** The credential that a card's code names, with its holder's name, or undefined. */
export async function findCredentialByCode(db: Db, cardCode: string): Promise<{ id: string, name: string } | undefined> {
  return db('credentials').join('people', 'people.id', 'credentials.personId').where({ cardCode }).first('credentials.id', 'people.name')
}

type Judged = 'verifiedBy' | 'verifiedAt' | 'verificationNote' | 'withdrawnOn' | 'withdrawnBy' | 'withdrawalReason'

/** Adds a credential as it stands. The card's code must be new. */
export async function insertCredential(db: Db, credential: Omit<StoredCredential, 'version' | Judged> & Partial<Pick<StoredCredential, Judged>>): Promise<void> {
  await db('credentials').insert({ ...credential, details: credential.details && JSON.stringify(credential.details) })
}

/** Changes a credential and counts its version up, which tells calendars that an event changed. */
export async function updateCredential(db: Db, id: string, changes: Partial<Omit<StoredCredential, 'id' | 'version' | 'details'>>): Promise<void> {
  await db('credentials').where({ id }).update({ ...changes, version: db.raw('version + 1') })
}

/** The versions of these credentials. */
export async function listVersions(db: Db, ids: string[]): Promise<Map<string, number>> {
  const rows: { id: string, version: number }[] = await db('credentials').whereIn('id', ids).select('id', 'version')
  return new Map(rows.map(row => [row.id, row.version]))
}

/** The names of these people, by id. */
export async function namesOf(db: Db, ids: (string | null)[]): Promise<Map<string, string>> {
  const rows: { id: string, name: string }[] = await db('people').whereIn('id', ids.filter(id => id !== null)).select('id', 'name')
  return new Map(rows.map(row => [row.id, row.name]))
}

/** The time zone of a site, or undefined when there is no such site. */
export async function zoneOfSite(db: Db, siteId: string): Promise<string | undefined> {
  return (await db('sites').where({ id: siteId }).first('timeZone'))?.timeZone
}

/** The crew that a person belongs to; undefined when there is no such person. */
export async function findHolder(db: Db, personId: string): Promise<{ id: string, crewId: string | null } | undefined> {
  return db('people').where({ id: personId }).first('id', 'crewId')
}
