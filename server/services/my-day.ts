import { addDays } from '#shared/domain/dates'
import type { BriefingListItem } from '#shared/schemas/briefing'
import type { MyDayView } from '#shared/schemas/my-day'
import { listSignedBriefingIds } from '../data/sign-ins'
import { listBriefings } from '../data/views/briefing-list'
import { placesOf } from './places'
import { expectedPeople } from './roster'
import type { Work } from './work'

/** A missed talk can be made up from this screen for so long. */
const daysOfMissed = 7

/** The actor's own day. Others' sign-ins are nobody's business here. */
export async function viewMyDay(work: Work): Promise<MyDayView> {
  const { db, actor } = work
  const sites = (await placesOf(work)).sites.filter(site => site.isRostered)
  const today: MyDayView['today'] = []
  const missed: MyDayView['missed'] = []
  for (const site of sites) {
    const { items } = await listBriefings(db, { siteIds: [site.id], from: addDays(site.date, -daysOfMissed), to: site.date, page: 1, perPage: 50 })
    const signed = await listSignedBriefingIds(db, actor.personId, items.map(item => item.id))
    const toOwn = ({ id, siteName, date, talkTitle, state }: BriefingListItem) => ({ id, siteCode: site.code, siteName, date, talkTitle, state, isSigned: signed.has(id) })
    today.push(...items.filter(item => item.date === site.date).map(toOwn))
    for (const item of items.filter(row => row.state === 'sealed' && !signed.has(row.id))) {
      const expected = await expectedPeople(db, site.id, item.date)
      if (expected.some(person => person.id === actor.personId)) missed.push(toOwn(item))
    }
  }
  return { sites: sites.map(({ id, code, name, date }) => ({ id, code, name, date })), today, missed }
}
