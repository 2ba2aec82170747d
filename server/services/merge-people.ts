import { isGuardedRole } from '#shared/access/abilities'
import { addDays } from '#shared/domain/dates'
import type { MergeBody, MergeView } from '#shared/schemas/people'
import { appendAudit } from '../data/audit'
import { countOwned, markMerged, moveOwned } from '../data/merge-people'
import { getPerson, updatePerson } from '../data/people'
import { requirePerson } from './people'
import { badField, Refusal } from './refusal'
import type { Work } from './work'

/**
 * Makes one of two entries for the same person: what the first owns goes to the other, which stays. Sealed sheets keep
 * what they say. With `preview` it only answers what would move. 409 for a manager's entry, oneself, or one already given up.
 */
export async function mergePerson(work: Work, id: string, { into }: MergeBody, isPreview: boolean): Promise<MergeView> {
  const [from, to] = [await requirePerson(work, id), await getPerson(work.db, into)]
  if (!to) throw badField('into', 'is not a person', 'unknownPerson')
  if (from.id === to.id) throw badField('into', 'is the same entry', 'samePerson')
  if (from.id === work.actor.personId || isGuardedRole(from.role)) throw new Refusal('conflict', 'guardedMerge', { message: 'A manager\'s entry is not given up like this' })
  if (from.mergedInto !== null || to.mergedInto !== null) throw new Refusal('conflict', 'alreadyMerged', { message: 'One of these was merged already' })
  const moves = await countOwned(work.db, from.id)
  const view = { from: { id: from.id, name: from.name, badge: from.badge }, into: { id: to.id, name: to.name, badge: to.badge }, moves }
  if (isPreview) return view
  await work.db.transaction(async (trx) => {
    await moveOwned(trx, from.id, to.id)
    const yesterday = addDays(work.today, -1)
    const leftOn = from.leftOn !== null && from.leftOn < yesterday ? from.leftOn : yesterday < from.hiredOn ? from.hiredOn : yesterday
    await markMerged(trx, { from: from.id, to: to.id, leftOn, now: work.now })
    // What the entry that stays does not know is taken from the other; hired is the earlier day.
    await updatePerson(trx, to.id, {
      ...(to.email === null && from.email !== null && { email: from.email }), ...(to.phone === null && from.phone !== null && { phone: from.phone }), ...(to.trade === null && from.trade !== null && { trade: from.trade }),
      ...(to.under18Until === null && from.under18Until !== null && { under18Until: from.under18Until }), hiredOn: from.hiredOn < to.hiredOn ? from.hiredOn : to.hiredOn,
    }, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'person.merged', subject: { kind: 'person', id: from.id }, before: { leftOn: from.leftOn, email: from.email, crewId: from.crewId }, after: { into: to.id, moves } })
  })
  return view
}
