import { randomUUID } from 'node:crypto'
import { dateInZone } from '#shared/domain/dates'
import type { Page } from '#shared/schemas/common'
import type { NamedListQuery, NewSiteBody, SiteChanges, SiteView } from '#shared/schemas/crews-and-sites'
import { appendAudit } from '../data/audit'
import type { Db } from '../data/database'
import { getPerson } from '../data/people'
import { siteIdsOfPersonOn } from '../data/places'
import { isWithin } from '../data/reach'
import { getOpenBriefingId, getSiteByCode, insertSite, listSites, updateSite } from '../data/sites'
import { matching, toPage } from './paging'
import { badField, notFound, Refusal } from './refusal'
import type { Work } from './work'

/** The sites that concern the actor: all for managers, otherwise those they lead and where they are rostered today. */
async function sitesWithinReach(work: Work): Promise<SiteView[]> {
  const { siteIds } = await work.reach()
  const own = siteIds === 'all' ? new Set<string>() : await siteIdsOfPersonOn(work.db, work.actor.personId, work.today)
  return (await listSites(work.db)).filter(site => isWithin(siteIds, site.id) || own.has(site.id))
}

/** A page of the sites within reach, in the company's order. */
export async function readSites(work: Work, query: NamedListQuery): Promise<Page<SiteView>> {
  return toPage(matching(await sitesWithinReach(work), query.q, site => [site.name, site.code, site.address]), query)
}

/** One site within reach, otherwise 404. */
export async function readSite(work: Work, id: string): Promise<SiteView> {
  const site = (await sitesWithinReach(work)).find(one => one.id === id)
  if (!site) throw notFound('site')
  return site
}

/** What the poster's page may know of a site: its name, and whether a briefing takes sign-ins there now. */
export async function readSiteLanding(work: Work<null>, code: string): Promise<{ code: string, name: string, openBriefingId?: string }> {
  const site = await getSiteByCode(work.db, code)
  if (!site) throw notFound('site')
  const openBriefingId = await getOpenBriefingId(work.db, site.id, dateInZone(work.now, site.timeZone))
  return { code: site.code, name: site.name, ...(openBriefingId && { openBriefingId }) }
}

/** Adds a site at the end of the order; 409 when its code is taken. A new site has no rules until one is posted. */
export async function addSite(work: Work, body: NewSiteBody): Promise<SiteView> {
  const id = randomUUID()
  await work.db.transaction(async (trx) => {
    await checkSite(trx, body)
    await insertSite(trx, { ...body, id, address: body.address ?? null, superintendentId: body.superintendentId ?? null }, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'site.added', subject: { kind: 'site', id }, after: body })
  })
  return readSite(work, id)
}

/** Changes a site. */
export async function changeSite(work: Work, id: string, body: SiteChanges): Promise<SiteView> {
  const before = await readSite(work, id)
  await work.db.transaction(async (trx) => {
    await checkSite(trx, body, id)
    await updateSite(trx, id, body)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'site.changed', subject: { kind: 'site', id }, before, after: body })
  })
  return readSite(work, id)
}

async function checkSite(db: Db, body: SiteChanges, id?: string): Promise<void> {
  const other = body.code && await getSiteByCode(db, body.code)
  if (other && other.id !== id) throw new Refusal('conflict', 'codeTaken', { message: 'Another site has this code', fields: { code: 'is another site\'s' } })
  if (body.superintendentId && !await getPerson(db, body.superintendentId)) throw badField('superintendentId', 'no such person', 'unknownPerson')
}
