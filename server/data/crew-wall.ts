import type { Credential } from '#shared/domain/validity'
import type { Db } from './database'

/** Somebody of a crew who works here on the date. */
export interface CrewMember { id: string, name: string }

/** The people of a crew on a date, by name. */
export async function listCrewMembers(db: Db, crewId: string, date: string): Promise<CrewMember[]> {
  return db('people').where({ crewId }).where('hiredOn', '<=', date).where(query => query.whereNull('leftOn').orWhere('leftOn', '>', date)).orderBy(['sortName', 'id']).select('id', 'name')
}

/** Every module credential of some people, with its module. */
export async function listModuleCredentialsOf(db: Db, personIds: readonly string[]): Promise<(Credential & { personId: string, module: string, leadDays: number })[]> {
  const rows = await db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId').whereIn('personId', personIds).whereNotNull('credentialTypes.module')
    .select('credentials.id', 'personId', 'credentialTypes.code as type', 'issuedOn', 'expiresOn', 'verification', 'withdrawnOn', 'details', 'credentialTypes.module', 'leadDays')
  return rows.map(({ details, ...row }) => ({ ...row, judgedOn: details ? (JSON.parse(details) as { judgedOn?: string }).judgedOn ?? null : null }))
}
