import type { PlacesView } from '#shared/schemas/places'
import { dateInZone } from '#shared/domain/dates'
import { isWithin } from '../data/reach'
import { listAllSites, siteIdsOfPersonOn } from '../data/places'
import type { Work } from './work'

/** The actor's sites with each one's own date: rostered today first, then led; managers get every site. */
export async function placesOf(work: Work): Promise<PlacesView> {
  const reach = await work.reach()
  const rostered = await siteIdsOfPersonOn(work.db, work.actor.personId, work.today)
  const sites = (await listAllSites(work.db))
    .map(site => ({ ...site, date: dateInZone(work.now, site.timeZone), isRostered: rostered.has(site.id) }))
    .filter(site => site.isRostered || isWithin(reach.siteIds, site.id))
  return { sites: [...sites.filter(site => site.isRostered), ...sites.filter(site => !site.isRostered)] }
}
