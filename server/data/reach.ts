import type { Actor } from '#shared/access/abilities'
import { reachesAll } from '#shared/access/abilities'
import { addDays } from '#shared/domain/dates'
import type { Db } from './database'

/** What somebody leads: `'all'` for managers, otherwise ids. */
export interface Reach {
  siteIds: 'all' | ReadonlySet<string>
  crewIds: 'all' | ReadonlySet<string>
}

/** A lead keeps a site for this long before and after the assignment, so that plans and late records work. */
const daysAround = { before: 60, after: 14 }

export const isWithin = (ids: 'all' | ReadonlySet<string>, id: string | null | undefined) => ids === 'all' || (!!id && ids.has(id))

/**
 * The crews and sites that the actor leads on `today`: a foreman's own crews and the sites they are rostered at;
 * a superintendent's sites and every crew rostered there.
 */
export async function loadReach(db: Db, actor: Actor, today: string): Promise<Reach> {
  if (reachesAll(actor)) return { siteIds: 'all', crewIds: 'all' }
  if (actor.role === 'worker') return { siteIds: new Set(), crewIds: new Set() }
  const current = () => db('assignments')
    .where('startsOn', '<=', addDays(today, daysAround.before))
    .where(query => query.whereNull('endsOn').orWhere('endsOn', '>=', addDays(today, -daysAround.after)))

  const ownCrews = await db('crews').where({ foremanId: actor.personId }).pluck('id')
  const ownSites = actor.role === 'superintendent' ? await db('sites').where({ superintendentId: actor.personId }).pluck('id') : []
  const crewIds = new Set<string>(ownCrews)
  for (const id of await current().whereIn('siteId', ownSites).whereNotNull('crewId').pluck('crewId')) crewIds.add(id)
  const siteIds = new Set<string>(ownSites)
  for (const id of await current().where(query => query.whereIn('crewId', ownCrews).orWhere({ personId: actor.personId })).pluck('siteId')) siteIds.add(id)
  return { siteIds, crewIds }
}
