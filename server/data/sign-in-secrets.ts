import type { Language, Role } from '#shared/domain/states'
import type { Db } from './database'

/** Somebody as the ways in see them. */
export interface SignInPerson {
  id: string
  name: string
  badge: string
  email: string | null
  role: Role
  language: Language
  crewId: string | null
  leftOn: string | null
  passwordHash: string | null
  pinHash: string | null
  firstUsedAt: string | null
}

/** True from the day on which somebody left: their ways in are closed. */
export const hasLeft = (person: Pick<SignInPerson, 'leftOn'>, today: string) => person.leftOn !== null && person.leftOn <= today

/** The person with that id, badge or e-mail, with their secrets' hashes; undefined when there is none. */
export async function getSignInPerson(db: Db, by: { id: string } | { badge: string } | { email: string }): Promise<SignInPerson | undefined> {
  const [column, value] = Object.entries(by)[0]!
  return db('people').leftJoin('signInSecrets', 'people.id', 'signInSecrets.personId').where(`people.${column}`, value).first(
    'people.id', 'people.name', 'people.badge', 'people.email', 'people.role', 'people.language', 'people.crewId', 'people.leftOn',
    'signInSecrets.passwordHash', 'signInSecrets.pinHash', 'signInSecrets.firstUsedAt',
  )
}

/** Keeps the hash of a new password or PIN; null ends the old one. */
export async function writeSecret(db: Db, personId: string, secret: { passwordHash: string | null } | { pinHash: string | null }, now: string): Promise<void> {
  await db('signInSecrets').insert({ personId, ...secret, setAt: now }).onConflict('personId').merge({ ...secret, setAt: now })
}

/** Remembers the first time somebody signed in; later ones change nothing. */
export async function markFirstSignIn(db: Db, personId: string, now: string): Promise<void> {
  await db('signInSecrets').where({ personId }).whereNull('firstUsedAt').update({ firstUsedAt: now })
}

/** Keeps somebody's language. */
export async function writeLanguage(db: Db, personId: string, language: Language, now: string): Promise<void> {
  await db('people').where({ id: personId }).update({ language, updatedAt: now })
}
