import { crewingOf, lockProblem, type CrewingPair, type PresenceRequirement } from '#shared/domain/crewing'
import { moduleBySlug } from '#shared/domain/curriculum'
import { dateInZone } from '#shared/domain/dates'
import { sameDayFixOf } from '#shared/domain/same-day-fix'
import { isCountingOn } from '#shared/domain/validity'
import type { CrewingBody, CrewingView, InvitationBody, UsualView } from '#shared/schemas/crewing'
import { appendAudit } from '../data/audit'
import { mapClearanceTypes, mapCredentials } from '../data/clearance-facts'
import type { Db } from '../data/database'
import { listDuties } from '../data/duties'
import { getPerson } from '../data/people'
import { listDesignated } from '../data/presence'
import { isWithin } from '../data/reach'
import { dutiesByCrew, listEmployed } from '../data/roster'
import { getSite } from '../data/sites'
import { invitationMail } from '../documents/invitation-mail'
import { openClearanceBook } from './clearance'
import { queueMail } from './mail'
import { moduleMinutesOf } from './module-minutes'
import { badField, notFound } from './refusal'
import { expectedAnywhere, expectedPeople } from './roster'
import type { Teaching } from './teaching'
import type { Work } from './work'

type Requirement = NonNullable<CrewingBody['presence']>[number]

async function requireSite(work: Work, siteId: string) {
  const site = await getSite(work.db, siteId)
  if (!site || !isWithin((await work.reach()).siteIds, site.id)) throw notFound('site')
  return site
}

/** A day's usual slots at a site, as saved for the crews that are rostered there, and the people rostered. 404 for a site out of reach. */
export async function readUsualDay(work: Work, { site: siteId, date: asked }: { site: string, date?: string }): Promise<UsualView> {
  const site = await requireSite(work, siteId)
  const date = asked ?? dateInZone(work.now, site.timeZone)
  const people = await expectedPeople(work.db, site.id, date)
  const usual = await dutiesByCrew(work.db)
  const counts = new Map<string, number>()
  for (const crewId of new Set(people.map(person => person.crewId))) {
    for (const { duty, count } of (crewId && usual.get(crewId)) || []) counts.set(duty, (counts.get(duty) ?? 0) + count)
  }
  return { date, slots: [...counts].map(([duty, count]) => ({ duty, count })), people: people.map(({ id, name, crewId }) => ({ id, name, crewId })) }
}

/** Who of the people asked about would meet a presence requirement on the date. */
async function metBy(db: Db, requirement: Requirement, { personIds, siteId, date }: { personIds: readonly string[], siteId: string, date: string }): Promise<string[]> {
  if ('designation' in requirement) {
    const named = new Set(await listDesignated(db, { kind: requirement.designation, subject: requirement.subject, siteId, date }))
    return personIds.filter(id => named.has(id))
  }
  const type = (await mapClearanceTypes(db)).get(requirement.type)
  const held = await mapCredentials(db, personIds)
  return personIds.filter(id => (held.get(id) ?? []).some(credential => credential.type === requirement.type && (!type?.perSite || credential.siteId === siteId) && isCountingOn(credential, date)))
}

/** The people to place: the roster, or those named, who must work here that day and be within the actor's reach. */
async function peopleOf(work: Work, body: CrewingBody): Promise<string[]> {
  if (!body.personIds) return (await expectedPeople(work.db, body.siteId, body.date)).map(person => person.id)
  const reach = await work.reach()
  const employed = new Set((await listEmployed(work.db, body.date)).map(person => person.id))
  const rostered = new Set((await expectedAnywhere(work.db, body.date)).filter(person => isWithin(reach.siteIds, person.siteId) || isWithin(reach.crewIds, person.crewId)).map(person => person.id))
  for (const id of body.personIds) {
    if (!employed.has(id) || (reach.crewIds !== 'all' && !rostered.has(id))) throw badField('personIds', 'holds somebody who is not yours to place that day')
  }
  return [...new Set(body.personIds)]
}

/**
 * Whether a day's slots can be filled by those rostered: exact, with the reason when short and the shortest fix in
 * minutes. 404 for a site out of reach; 422 for an unknown duty, type, or a placement by hand that can't be kept.
 */
export async function crewDay(work: Work, teaching: Teaching, body: CrewingBody): Promise<CrewingView> {
  const { db } = work
  await requireSite(work, body.siteId)
  const duties = new Map((await listDuties(db)).map(duty => [duty.code, duty]))
  for (const [index, { duty }] of body.slots.entries()) if (!duties.has(duty)) throw badField(`slots.${index}.duty`, 'is no duty')
  const types = await mapClearanceTypes(db)
  for (const [index, one] of (body.presence ?? []).entries()) if ('type' in one && !types.has(one.type)) throw badField(`presence.${index}.type`, 'is no credential type')
  const personIds = await peopleOf(work, body)
  const problem = lockProblem({ slots: body.slots, personIds, locked: body.locked })
  if (problem) throw badField('locked', { notRostered: 'holds somebody who is not rostered', noSlot: 'holds more people than the duty has slots', personTwice: 'holds somebody twice' }[problem], problem)

  const book = await openClearanceBook(db, { whom: personIds, date: body.date, moduleMinutes: moduleMinutesOf(teaching) })
  const asked = [...new Set(body.slots.map(slot => slot.duty))]
  const pairs: CrewingPair[] = personIds.flatMap(personId => asked.map((duty) => {
    const clearance = book.ask(personId, duty, body.siteId)
    return { personId, duty, state: clearance.state, fix: sameDayFixOf({ clearance, hasSameDayFix: duties.get(duty)!.sameDayFix, date: body.date }) }
  }))
  const presence: PresenceRequirement<Requirement>[] = []
  for (const requirement of body.presence ?? []) presence.push({ requirement, metBy: await metBy(db, requirement, { personIds, siteId: body.siteId, date: body.date }) })
  const { crewed, assignment, short, unfillable, because, presenceMissing, fix } = crewingOf({ slots: body.slots, personIds, pairs, locked: body.locked, presence })
  return { crewed, assignment, short, presenceMissing, ...(unfillable.length > 0 && { unfillable }), ...(because && { because }), ...(fix && { fix }) }
}

/** Mails the people of a fix the modules that they need; the same invitation once a day. Answers who has no address. 404 for somebody unknown, 422 for no such module. */
export async function inviteToModules(work: Work, { steps }: InvitationBody) {
  const people = new Map<string, { person: NonNullable<Awaited<ReturnType<typeof getPerson>>>, modules: Set<string> }>()
  for (const [index, { personId, modules }] of steps.entries()) {
    const person = await getPerson(work.db, personId)
    if (!person) throw notFound('person')
    if (modules.some(slug => !moduleBySlug(slug))) throw badField(`steps.${index}.modules`, 'holds no module of the wall')
    const asked = people.get(personId) ?? { person, modules: new Set<string>() }
    for (const slug of modules) asked.modules.add(slug)
    people.set(personId, asked)
  }
  const mailable = [...people.values()].filter(({ person }) => person.email !== null)
  await work.db.transaction(async (trx) => {
    for (const { person, modules } of mailable) {
      const lines = [...modules].map(slug => ({ title: moduleBySlug(slug)!.title[person.language], link: `${work.settings.linkOrigin}/learn/${slug}` }))
      await queueMail(trx, { key: `invitation:${work.today}:${person.id}:${[...modules].sort().join('+')}`, recipient: person.email!, personId: person.id, ...invitationMail(person.language, { name: person.name, lines }), now: work.now })
    }
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'modules.invited', subject: { kind: 'company', id: '1' }, after: { people: people.size } })
  })
  return { queued: mailable.length, withoutEmail: [...people.values()].filter(({ person }) => person.email === null).map(({ person }) => ({ personId: person.id, name: person.name })) }
}
