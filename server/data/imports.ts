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

/** Adds people of an import. */
export async function insertImportedPeople(db: Db, people: readonly ImportedPerson[], now: string): Promise<void> {
  for (const person of people) await db('people').insert({ ...person, createdAt: now, updatedAt: now })
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
