import type { Language, Role } from '#shared/domain/states'
import type { Db } from './database'

/** True when anybody is on the roster. */
export const hasPeople = async (db: Db): Promise<boolean> => !!await db('people').first('id')

/** The badge of the first admin; the office may change it. */
const firstBadge = '1'

/** Writes the first person of a new company with their password. */
export async function insertFirstAdmin(db: Db, admin: { id: string, name: string, sortName: string, role: Role, language: Language, email: string, employer: string, hiredOn: string, passwordHash: string, now: string }): Promise<void> {
  const { passwordHash, now, ...person } = admin
  await db('people').insert({ ...person, badge: firstBadge, employerKind: 'own', createdAt: now, updatedAt: now })
  await db('signInSecrets').insert({ personId: person.id, passwordHash, setAt: now })
}
