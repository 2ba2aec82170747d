import type { Allowance } from '#shared/domain/clearance'
import type { Db } from './database'

export interface StoredAllowance extends Allowance { id: string, allowedBy: string, createdAt: string }

/** The allowances of a date, by person. */
export async function mapAllowances(db: Db, date: string): Promise<Map<string, Allowance[]>> {
  const rows: (Allowance & { personId: string })[] = await db('allowances').join('credentials', 'credentials.id', 'allowances.credentialId').where({ date })
    .select('personId', 'credentialId', 'allowances.siteId', 'date')
  const found = new Map<string, Allowance[]>()
  for (const { personId, ...allowance } of rows) found.set(personId, [...found.get(personId) ?? [], allowance])
  return found
}

/** The allowance of a card at a site on a date, if there is one. */
export const findAllowance = (db: Db, match: Allowance): Promise<StoredAllowance | undefined> => db('allowances').where(match).first('id', 'credentialId', 'siteId', 'date', 'allowedBy', 'createdAt')

/** Keeps an allowance. */
export const insertAllowance = (db: Db, row: StoredAllowance): Promise<unknown> => db('allowances').insert(row)

/** A site's allowances of a date with names, for the sheet of that day. */
export async function listAllowancesOf(db: Db, { siteId, date }: { siteId: string, date: string }): Promise<{ person: string, type: string, allowedBy: string }[]> {
  return db('allowances').join('credentials', 'credentials.id', 'allowances.credentialId').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId')
    .join('people', 'people.id', 'credentials.personId').join('people as givers', 'givers.id', 'allowances.allowedBy')
    .where({ 'allowances.siteId': siteId, date }).orderBy(['people.sortName', 'credentialTypes.code'])
    .select('people.name as person', 'credentialTypes.code as type', 'givers.name as allowedBy')
}

/** True when somebody is named in writing as a competent person, of any subject, at this site on the date. */
export async function isCompetentAt(db: Db, personId: string, { siteId, date }: { siteId: string, date: string }): Promise<boolean> {
  const row = await db('designations').where({ kind: 'competent', personId }).where('startsOn', '<=', date)
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date))
    .where(query => query.whereNull('siteId').orWhere({ siteId })).first('id')
  return row !== undefined
}
