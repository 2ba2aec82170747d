import type { Db } from './database'

export interface Site {
  id: string
  code: string
  name: string
  timeZone: string
  address: string | null
  superintendentId: string | null
}

const columns = ['id', 'code', 'name', 'timeZone', 'address', 'superintendentId'] as const

/** A site by its id, or undefined. */
export async function getSite(db: Db, id: string): Promise<Site | undefined> {
  return db('sites').where({ id }).first(...columns)
}

/** A site by its public code, in any case of letters, or undefined. */
export async function getSiteByCode(db: Db, code: string): Promise<Site | undefined> {
  return db('sites').whereRaw('lower(code) = lower(?)', [code]).first(...columns)
}

/** Every site, in the company's order. */
export async function listSites(db: Db): Promise<Site[]> {
  return db('sites').orderBy(['position', 'name', 'id']).select(...columns)
}

/** Adds a site at the end of the order. */
export async function insertSite(db: Db, site: Site, now: string): Promise<void> {
  const last = await db('sites').max('position as position').first()
  await db('sites').insert({ ...site, position: (last?.position ?? -1) + 1, createdAt: now })
}

/** Changes a site. */
export async function updateSite(db: Db, id: string, changes: Partial<Omit<Site, 'id'>>): Promise<void> {
  if (Object.keys(changes).length > 0) await db('sites').where({ id }).update(changes)
}

/** The briefing that takes sign-ins at a site on its own date: an open one, otherwise the last that is closed but not sealed. */
export async function getOpenBriefingId(db: Db, siteId: string, date: string): Promise<string | undefined> {
  const row = await db('briefings').where({ siteId, localDate: date }).whereNull('sealedAt').orderByRaw('closed_at is null desc, opened_at desc, id').first('id')
  return row?.id
}
