import type { Db } from './database'

export interface PacketRow { id: string, tokenHash: string, siteId: string, madeBy: string, madeAt: string, endsOn: string, revokedAt: string | null, body: string, hash: string }

/** Keeps a packet as it was handed over. */
export const insertPacket = (db: Db, row: PacketRow): Promise<unknown> => db('packets').insert(row)

/** By its link's hash, or its id. */
export const findPacket = (db: Db, match: { tokenHash: string } | { id: string }): Promise<PacketRow | undefined> => db('packets').where(match).first()

/** Ends a link for good; false when that was done before. */
export async function revokePacket(db: Db, id: string, now: string): Promise<boolean> {
  return await db('packets').where({ id }).whereNull('revokedAt').update({ revokedAt: now }) === 1
}

/** Notes that somebody with the link looked. */
export const insertPacketView = (db: Db, view: { packetId: string, part: 'page' | 'pdf', viewedAt: string }): Promise<unknown> => db('packetViews').insert(view)

/** The packets of some sites, the newest first, with their names and every view. */
export async function listPackets(db: Db, match: { siteIds: 'all' | ReadonlySet<string>, page: number, perPage: number }) {
  const asked = db('packets').join('sites', 'sites.id', 'packets.siteId').join('people', 'people.id', 'packets.madeBy')
  if (match.siteIds !== 'all') asked.whereIn('packets.siteId', [...match.siteIds])
  const total = Number((await asked.clone().count({ count: '*' }).first())?.count ?? 0)
  const rows: (PacketRow & { site: string, timeZone: string, maker: string })[] = await asked.orderBy([{ column: 'madeAt', order: 'desc' }, { column: 'packets.id' }]).limit(match.perPage).offset((match.page - 1) * match.perPage)
    .select('packets.*', 'sites.name as site', 'sites.timeZone', 'people.name as maker')
  const views: { packetId: string, part: 'page' | 'pdf', viewedAt: string }[] = await db('packetViews').whereIn('packetId', rows.map(row => row.id)).orderBy('viewedAt', 'desc').select('packetId', 'part', 'viewedAt')
  return { total, rows: rows.map(row => ({ ...row, views: views.filter(view => view.packetId === row.id).map(({ part, viewedAt }) => ({ part, viewedAt })) })) }
}

/** Employer and trade of some people, by id. */
export async function mapTrades(db: Db, personIds: readonly string[]): Promise<Map<string, { employer: string, trade: string | null }>> {
  const rows: { id: string, employer: string, trade: string | null }[] = await db('people').whereIn('id', personIds).select('id', 'employer', 'trade')
  return new Map(rows.map(({ id, ...row }) => [id, row]))
}
