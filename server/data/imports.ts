import type { Language, Role, EmployerKind } from '#shared/domain/states'
import type { Db } from './database'

/** A person as an import compares them. */
export interface ImportedPerson {
  id: string
  name: string
  sortName: string
  badge: string
  email: string | null
  phone: string | null
  role: Role
  language: Language
  employer: string
  employerKind: EmployerKind
  trade: string | null
  hiredOn: string
  leftOn: string | null
  crewId: string | null
}

const fields = ['id', 'name', 'sortName', 'badge', 'email', 'phone', 'role', 'language', 'employer', 'employerKind', 'trade', 'hiredOn', 'leftOn', 'crewId']

/** Everybody, to match an import's rows by badge or e-mail. */
export async function listImportedPeople(db: Db): Promise<ImportedPerson[]> {
  return db('people').select(...fields)
}

/** Crews and sites by what people call them: id, and code or name. */
export async function listPlaceNames(db: Db): Promise<{ crews: { id: string, name: string }[], sites: { id: string, name: string, code: string }[] }> {
  return { crews: await db('crews').select('id', 'name'), sites: await db('sites').select('id', 'name', 'code') }
}

/** Adds a person of an import. */
export async function insertImportedPerson(db: Db, person: ImportedPerson, now: string): Promise<void> {
  await db('people').insert({ ...person, createdAt: now, updatedAt: now })
}

/** Changes what an import says anew of a person. */
export async function updateImportedPerson(db: Db, id: string, changes: Partial<ImportedPerson>, now: string): Promise<void> {
  await db('people').where({ id }).update({ ...changes, version: db.raw('version + 1'), updatedAt: now })
}

/** A credential as an import compares it. */
export interface HeldCredential { id: string, personId: string, typeId: string, issuedOn: string, siteId: string | null, expiresOn: string | null, number: string | null, issuer: string | null, verification: string }

/** Every outside credential, to find what an import repeats. */
export async function listHeldCredentials(db: Db): Promise<HeldCredential[]> {
  return db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId').whereNull('credentialTypes.module')
    .select('credentials.id', 'personId', 'typeId', 'issuedOn', 'siteId', 'expiresOn', 'number', 'issuer', 'verification')
}

export type ImportKind = 'people' | 'credentials'

/** What columns meant in earlier imports: plain header → field, null for "not used". */
export async function listChosenColumns(db: Db, kind: ImportKind): Promise<Map<string, string | null>> {
  const rows: { header: string, field: string }[] = await db('importColumns').where({ kind }).select('header', 'field')
  return new Map(rows.map(row => [row.header, row.field || null]))
}

/** Remembers what columns mean, for the next file headed like this one. */
export async function keepChosenColumns(db: Db, kind: ImportKind, chosen: ReadonlyMap<string, string | null>, now: string): Promise<void> {
  for (const [header, field] of chosen) await db('importColumns').insert({ kind, header, field: field ?? '', chosenAt: now }).onConflict(['kind', 'header']).merge()
}
