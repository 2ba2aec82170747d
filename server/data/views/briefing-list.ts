import type { BriefingListItem } from '#shared/schemas/briefing'
import type { BriefingState } from '#shared/domain/states'
import type { Page } from '#shared/schemas/common'
import type { Db } from '../database'
import type { TalkVersions } from '../briefings'

export interface BriefingFilter { siteIds: 'all' | readonly string[], site?: string, from?: string, to?: string, state?: BriefingState, page: number, perPage: number }

interface Row { id: string, siteId: string, siteName: string, timeZone: string, localDate: string, talk: string, talkVersions: string, openedAt: string, closedAt: string | null, sealedAt: string | null, runBy: string, count: number, late: number, hash: string | null }

const stateOf = (row: Pick<Row, 'closedAt' | 'sealedAt'>): BriefingState => (row.sealedAt ? 'sealed' : row.closedAt ? 'closed' : 'open')

function toItem(row: Row): BriefingListItem {
  const versions = JSON.parse(row.talkVersions) as TalkVersions
  return {
    id: row.id, siteId: row.siteId, siteName: row.siteName, timeZone: row.timeZone, date: row.localDate, talk: row.talk, talkTitle: { en: versions.en.title, es: versions.es.title },
    state: stateOf(row), openedAt: row.openedAt, runBy: row.runBy, count: row.count, late: row.late, hash: row.hash,
  }
}

/** Briefings of the sites within reach, the latest first, with how many signed. */
export async function listBriefings(db: Db, filter: BriefingFilter): Promise<Page<BriefingListItem>> {
  const { siteIds, site, from, to, state, page, perPage } = filter
  const asked = db('briefings').join('sites', 'sites.id', 'briefings.siteId').join('people', 'people.id', 'briefings.runBy')
  if (siteIds !== 'all') asked.whereIn('briefings.siteId', siteIds)
  if (site) asked.where({ 'briefings.siteId': site })
  if (from) asked.where('localDate', '>=', from)
  if (to) asked.where('localDate', '<=', to)
  if (state === 'sealed') asked.whereNotNull('sealedAt')
  if (state === 'closed') asked.whereNotNull('closedAt').whereNull('sealedAt')
  if (state === 'open') asked.whereNull('closedAt')
  const total = Number((await asked.clone().count({ count: '*' }).first())?.count ?? 0)
  const rows: Row[] = await asked.orderBy([{ column: 'localDate', order: 'desc' }, { column: 'openedAt', order: 'desc' }, { column: 'briefings.id' }])
    .limit(perPage).offset((page - 1) * perPage)
    .select('briefings.id', 'briefings.siteId', 'sites.name as siteName', 'sites.timeZone', 'localDate', 'talk', 'talkVersions', 'openedAt', 'closedAt', 'briefings.sealedAt', 'people.name as runBy')
    .select({
      count: db('signIns').whereRaw('sign_ins.briefing_id = briefings.id').whereNull('removedAt').count(),
      late: db('signIns').whereRaw('sign_ins.briefing_id = briefings.id and sign_ins.late = 1').whereNull('removedAt').count(),
      hash: db('sheets').whereRaw('sheets.briefing_id = briefings.id and sheets.kind = \'sheet\'').select('hash'),
    })
  return { items: rows.map(toItem), total, page, perPage }
}
