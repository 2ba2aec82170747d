import type { Actor } from '#shared/access/abilities'
import type { CredentialFilters } from '#shared/schemas/credentials'
import { appendAudit } from '../data/audit'
import { deleteCalendarLinks, findCalendarOwner, insertCalendarLink } from '../data/calendar-links'
import { loadReach } from '../data/reach'
import { calendarOf } from './credential-export'
import { toCredentialQuery } from './credentials'
import { randomToken, sha256 } from './hashing'
import { notFound } from './refusal'
import type { Work } from './work'

/** Makes a calendar address for the actor: whoever has it sees what the actor may see, until it is ended. Shown once. */
export async function makeCalendarFeed(work: Work, filters: CredentialFilters, origin: string): Promise<{ url: string }> {
  const token = randomToken()
  const { personId, role } = work.actor
  await work.db.transaction(async (trx) => {
    await insertCalendarLink(trx, { tokenHash: sha256(token), personId, grant: { asWorker: role === 'worker', filters }, now: work.now })
    await appendAudit(trx, { at: work.now, actorId: personId, action: 'calendar.linked', subject: { kind: 'person', id: personId }, after: { filters } })
  })
  return { url: `${origin}/api/calendar/${token}.ics` }
}

/** Ends all calendar addresses of the actor; the calendars that use them get nothing more. */
export async function endCalendarFeeds(work: Work): Promise<void> {
  const { personId } = work.actor
  await work.db.transaction(async (trx) => {
    const ended = await deleteCalendarLinks(trx, personId)
    if (ended > 0) await appendAudit(trx, { at: work.now, actorId: personId, action: 'calendar.unlinked', subject: { kind: 'person', id: personId }, after: { ended } })
  })
}

/** The renewals that the owner of the link may see today, as iCalendar. 404 for an unknown or ended link, or when the owner left. */
export async function readCalendarFeed(work: Work<Actor | null>, token: string): Promise<string> {
  const owner = await findCalendarOwner(work.db, sha256(token.replace(/\.ics$/, '')))
  if (!owner || (owner.leftOn !== null && owner.leftOn < work.today)) throw notFound('calendar')
  const actor: Actor = { personId: owner.personId, name: owner.name, role: owner.grant.asWorker ? 'worker' : owner.role, givenRole: owner.role, language: owner.language, via: 'password' }
  const theirs: Work = { ...work, actor, reach: () => loadReach(work.db, actor, work.today) }
  const query = await toCredentialQuery(theirs, { effective: true, ...owner.grant.filters })
  return calendarOf(work, query, owner.language)
}
