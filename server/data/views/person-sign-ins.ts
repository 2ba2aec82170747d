import type { SignInMethod } from '#shared/domain/states'
import type { PersonRecordView } from '#shared/schemas/person-record'
import type { TalkVersions } from '../briefings'
import type { Db } from '../database'

interface Row { briefingId: string, date: string, site: string, talkVersions: string, method: SignInMethod, late: number }

/** The briefings that somebody signed, the latest first; those taken off the list are left out. */
export async function listSignInsOf(db: Db, personId: string, most: number): Promise<PersonRecordView['signIns']> {
  const rows: Row[] = await db('signIns').join('briefings', 'briefings.id', 'signIns.briefingId').join('sites', 'sites.id', 'briefings.siteId')
    .where({ personId }).whereNull('removedAt')
    .orderBy([{ column: 'localDate', order: 'desc' }, { column: 'signedAt', order: 'desc' }]).limit(most)
    .select('briefingId', 'localDate as date', 'sites.name as site', 'talkVersions', 'method', 'late')
  return rows.map(({ talkVersions, late, ...row }) => {
    const versions = JSON.parse(talkVersions) as TalkVersions
    return { ...row, late: late === 1, talkTitle: { en: versions.en.title, es: versions.es.title } }
  })
}
