import { randomUUID } from 'node:crypto'
import { canBeAllowedForAShift } from '#shared/domain/clearance'
import { dateInZone } from '#shared/domain/dates'
import type { AllowanceBody, AllowanceView } from '#shared/schemas/allowances'
import { findAllowance, insertAllowance, isCompetentAt } from '../data/allowances'
import { appendAudit } from '../data/audit'
import { findCredential, listStoredTypes } from '../data/credentials'
import { getSite } from '../data/sites'
import { badField, notFound, Refusal } from './refusal'
import { expectedPeople } from './roster'
import type { Work } from './work'

/**
 * Lets a card that nobody verified yet count for one shift at one site, because a competent person there looked at
 * it: today only, for somebody rostered there, and written on that day's sheet. A repeat answers with the first. 403
 * for who is not named as a competent person at the site, 404 for a card of nobody there, 409 for a card that was
 * judged, 422 for another day or where the law asks for the evaluation itself.
 */
export async function allowForAShift(work: Work, { credentialId, siteId, date }: AllowanceBody): Promise<AllowanceView> {
  const { db, actor, now } = work
  const site = await getSite(db, siteId)
  if (!site) throw notFound('site')
  if (!await isCompetentAt(db, actor.personId, { siteId, date })) throw new Refusal('forbidden', 'notCompetentPerson', { message: 'Only a competent person named for this site may allow a shift' })
  const credential = await findCredential(db, credentialId)
  if (!credential || !(await expectedPeople(db, siteId, date)).some(person => person.id === credential.personId)) throw notFound('credential')
  if (credential.personId === actor.personId) throw new Refusal('forbidden', 'ownCard', { message: 'Nobody allows their own card' })
  if (date !== dateInZone(now, site.timeZone)) throw badField('date', 'must be today at the site: the card is looked at on the day', 'onlyToday')
  const known = await findAllowance(db, { credentialId, siteId, date })
  if (known) return known
  if (credential.withdrawnOn || credential.verification !== 'unverified') throw new Refusal('conflict', 'alreadyJudged', { message: 'The card was judged already' })
  const type = (await listStoredTypes(db)).find(one => one.id === credential.typeId)
  if (!type || !canBeAllowedForAShift(type)) throw badField('credentialId', 'the law asks for the evaluation itself', 'lawAsks')
  const allowance = { id: randomUUID(), credentialId, siteId, date, allowedBy: actor.personId, createdAt: now }
  await db.transaction(async (trx) => {
    await insertAllowance(trx, allowance)
    await appendAudit(trx, { at: now, actorId: actor.personId, action: 'allowance.given', subject: { kind: 'credential', id: credentialId }, after: { siteId, date } })
  })
  return allowance
}
