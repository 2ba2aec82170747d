import type { Db } from './database'

/** Who is named in writing for a kind and subject on a date: everywhere, or at this site. */
export async function listDesignated(db: Db, { kind, subject, siteId, date }: { kind: string, subject: string, siteId: string, date: string }): Promise<string[]> {
  const rows: { personId: string }[] = await db('designations').where({ kind, subject }).where('startsOn', '<=', date)
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', date))
    .where(query => query.whereNull('siteId').orWhere({ siteId })).distinct('personId')
  return rows.map(row => row.personId)
}
