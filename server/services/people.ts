import { randomUUID } from 'node:crypto'
import { isGuardedRole } from '#shared/access/abilities'
import { sortNameOf } from '#shared/domain/names'
import type { Role } from '#shared/domain/states'
import type { Page } from '#shared/schemas/common'
import type { NewPersonBody, PeopleQuery, PersonChanges, PersonView } from '#shared/schemas/people'
import { appendAudit } from '../data/audit'
import { listCrews } from '../data/crews'
import type { Db } from '../data/database'
import { getPasswordHash, getPerson, insertPerson, isTaken, listMailable, listPeople, updatePerson, type Person, type PersonRow } from '../data/people'
import { isWithin } from '../data/reach'
import { listRoster } from '../data/roster'
import { clearWrongTries, countWrongTry, getWaitSeconds } from '../data/sign-in-waits'
import { roleGrantedMail } from '../documents/role-granted-mail'
import { sha256 } from './hashing'
import { queueMail } from './mail'
import { isRightSecret } from './passwords'
import { badField, notFound, Refusal } from './refusal'
import { endSessionsOf } from './sessions'
import type { Work } from './work'

/** What is answered of a person: everything but the hidden date. */
function toView({ under18Until: _hidden, ...person }: Person): PersonView {
  return person
}

/** A person whom the actor may know: oneself, own crews, rostered today at own sites; managers know everybody. Otherwise 404. */
export async function requirePerson(work: Work, id: string): Promise<Person> {
  const person = await getPerson(work.db, id)
  if (!person) throw notFound('person')
  const reach = await work.reach()
  if (reach.siteIds === 'all' || id === work.actor.personId || isWithin(reach.crewIds, person.crewId)) return person
  const rostered = (await listRoster(work.db, { date: work.today })).find(one => one.id === id)
  if (!rostered || !isWithin(reach.siteIds, rostered.siteId)) throw notFound('person')
  return person
}

/** The people within reach, filtered and sorted, a page of them. */
export async function readPeople(work: Work, query: PeopleQuery): Promise<Page<PersonView>> {
  const { items, total } = await listPeople(work.db, { query, reach: await work.reach(), selfId: work.actor.personId, today: work.today })
  return { items: items.map(toView), total, page: query.page, perPage: query.perPage }
}

/** One person within reach. */
export const readPerson = async (work: Work, id: string): Promise<PersonView> => toView(await requirePerson(work, id))

/** Adds a person; 409 when the badge or the e-mail is another's. */
export async function addPerson(work: Work, body: NewPersonBody): Promise<PersonView> {
  const { currentPassword, ...given } = body
  if (isGuardedRole(body.role)) await requireOwnPassword(work, currentPassword)
  const id = randomUUID()
  const row: PersonRow = {
    name: given.name, sortName: given.sortName ?? sortNameOf(given.name), badge: given.badge, email: given.email ?? null, phone: given.phone ?? null,
    role: given.role, language: given.language ?? work.company.language, readsWell: given.readsWell ?? null,
    employer: given.employer ?? work.company.name, employerKind: given.employerKind, trade: given.trade ?? null,
    hiredOn: given.hiredOn ?? work.today, leftOn: given.leftOn ?? null, crewId: given.crewId ?? null, under18Until: given.under18Until ?? null,
  }
  await work.db.transaction(async (trx) => {
    await checkPerson(trx, row, work.today)
    await insertPerson(trx, { id, ...row }, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'person.added', subject: { kind: 'person', id }, after: forAudit(row) })
    if (isGuardedRole(row.role)) await tellOfRole(trx, work, { id, name: row.name, role: row.role })
  })
  return readPerson(work, id)
}

/**
 * Changes a person. Nobody changes their own role or ends their own employment; a guarded role asks for the
 * password again. A new role or a last day that has come ends that person's sessions.
 */
export async function changePerson(work: Work, id: string, body: PersonChanges): Promise<PersonView> {
  const { currentPassword, version, ...given } = body
  const before = await requirePerson(work, id)
  const isNewRole = given.role !== undefined && given.role !== before.role
  if (isNewRole && id === work.actor.personId) throw new Refusal('forbidden', 'ownRole', { message: 'Nobody changes their own role' })
  if (given.leftOn && id === work.actor.personId) throw new Refusal('forbidden', 'ownRole', { message: 'Another admin has to write your last day' })
  if (isNewRole && given.role && isGuardedRole(given.role)) await requireOwnPassword(work, currentPassword)
  const changes = toChanges(given)
  const after = await work.db.transaction(async (trx) => {
    const current = await getPerson(trx, id)
    if (!current) throw notFound('person')
    if (version !== undefined && version !== current.version) throw new Refusal('conflict', 'changed', { message: 'Somebody changed this before you' })
    const { id: _id, version: _version, hasSignedIn: _hasSignedIn, ...row } = { ...current, ...changes }
    await checkPerson(trx, row, work.today, current)
    await updatePerson(trx, id, changes, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'person.changed', subject: { kind: 'person', id }, before: forAudit(pick(current, changes)), after: forAudit(changes) })
    if (isNewRole && isGuardedRole(row.role)) await tellOfRole(trx, work, { id, name: row.name, role: row.role })
    return row
  })
  const hasJustLeft = !!after.leftOn && after.leftOn <= work.today && after.leftOn !== before.leftOn
  if (isNewRole || hasJustLeft) await endSessionsOf(work.db, work.settings, id)
  return readPerson(work, id)
}

/** What a change writes: a new name computes its sorting anew unless that is sent; `null` as a sort name asks for the computed one. */
function toChanges({ sortName, ...given }: Omit<PersonChanges, 'currentPassword' | 'version'>): Partial<PersonRow> {
  const changes: Partial<PersonRow> = { ...given }
  if (sortName) changes.sortName = sortName
  else if (given.name) changes.sortName = sortNameOf(given.name)
  return changes
}

function pick(person: Person, changes: Partial<PersonRow>): Partial<PersonRow> {
  return Object.fromEntries(Object.keys(changes).map(key => [key, person[key as keyof PersonRow]]))
}

/** The hidden date stays out of the trail's readable part; that it was written is told. */
function forAudit({ under18Until, ...row }: Partial<PersonRow>) {
  return under18Until === undefined ? row : { ...row, hasAgeLimit: under18Until !== null }
}

async function checkPerson(db: Db, row: PersonRow, today: string, before?: Person): Promise<void> {
  const taken = (field: 'badge' | 'email') => new Refusal('conflict', `${field}Taken`, { message: `Another person has this ${field}`, fields: { [field]: 'is another person\'s' } })
  if (row.badge !== before?.badge && await isTaken(db, { badge: row.badge }, before?.id)) throw taken('badge')
  if (row.email && row.email !== before?.email && await isTaken(db, { email: row.email }, before?.id)) throw taken('email')
  if (row.leftOn && row.leftOn < row.hiredOn) throw badField('leftOn', 'is before the first day', 'datesSwapped')
  if (row.crewId && row.crewId !== before?.crewId && (await listCrews(db, today, row.crewId)).length === 0) throw badField('crewId', 'no such crew', 'unknownCrew')
}

/** Asks who acts for their own password again; wrong ones slow down like wrong sign-ins. */
async function requireOwnPassword(work: Work, password: string | undefined): Promise<void> {
  const { db, now, actor } = work
  const refusal = new Refusal('forbidden', 'passwordNeeded', { message: 'Type your own password to grant this role', fields: { currentPassword: password === undefined ? 'is needed' : 'is wrong' } })
  if (password === undefined) throw refusal
  const key = sha256(`confirm:${actor.personId}`)
  const seconds = await getWaitSeconds(db, key, now)
  if (seconds > 0) throw new Refusal('tooMany', 'tooManyTries', { retryAfter: seconds, data: { retryAfter: Math.ceil(seconds) } })
  if (!await isRightSecret(await getPasswordHash(db, actor.personId), password)) {
    await countWrongTry(db, key, now)
    throw refusal
  }
  await clearWrongTries(db, key)
}

async function tellOfRole(db: Db, work: Work, person: { id: string, name: string, role: Role }): Promise<void> {
  for (const reader of await listMailable(db, ['safety', 'admin'], work.today)) {
    const { subject, body } = roleGrantedMail(reader.language, { granter: work.actor.name, name: person.name, role: person.role, company: work.company.name })
    await queueMail(db, { key: `role:${person.id}:${person.role}:${work.now}:${reader.id}`, recipient: reader.email, personId: reader.id, subject, body, now: work.now })
  }
}
