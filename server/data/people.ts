import type { EmployerKind, Language, Role } from '#shared/domain/states'
import type { PeopleQuery } from '#shared/schemas/people'
import type { Db } from './database'
import type { Reach } from './reach'
import { listRoster } from './roster'

/** A person as the company keeps them. `under18Until` is for the rules only and never leaves the server. */
export interface Person {
  id: string
  name: string
  sortName: string
  badge: string
  email: string | null
  phone: string | null
  role: Role
  language: Language
  readsWell: boolean | null
  employer: string
  employerKind: EmployerKind
  trade: string | null
  hiredOn: string
  leftOn: string | null
  crewId: string | null
  under18Until: string | null
  /** The entry that stays, when this one was given up as a duplicate. */
  mergedInto: string | null
  version: number
  hasSignedIn: boolean
}
/** What is written of a person. */
export type PersonRow = Omit<Person, 'id' | 'version' | 'hasSignedIn' | 'mergedInto'>

type StoredPerson = Omit<Person, 'readsWell' | 'hasSignedIn'> & { readsWell: 0 | 1 | null, firstUsedAt: string | null }

const columns = ['id', 'name', 'sortName', 'badge', 'email', 'phone', 'role', 'language', 'readsWell', 'employer', 'employerKind', 'trade', 'hiredOn', 'leftOn', 'crewId', 'under18Until', 'mergedInto', 'version'].map(name => `people.${name}`)
const toPerson = ({ firstUsedAt, readsWell, ...row }: StoredPerson): Person => ({ ...row, readsWell: readsWell === null ? null : readsWell === 1, hasSignedIn: firstUsedAt !== null })
const withSignIn = (db: Db) => db('people').leftJoin('signInSecrets', 'signInSecrets.personId', 'people.id')

/** A person by id, or undefined. */
export async function getPerson(db: Db, id: string): Promise<Person | undefined> {
  const row: StoredPerson | undefined = await withSignIn(db).where('people.id', id).first(...columns, 'signInSecrets.firstUsedAt')
  return row && toPerson(row)
}

/** True when another person has this badge or this (lower-case) e-mail. */
export async function isTaken(db: Db, what: { badge: string } | { email: string }, exceptId?: string): Promise<boolean> {
  const found = await db('people').where(what).modify(query => exceptId !== undefined && query.whereNot({ id: exceptId })).first('id')
  return found !== undefined
}

/** Adds a person. */
export async function insertPerson(db: Db, person: PersonRow & { id: string }, now: string): Promise<void> {
  await db('people').insert({ ...person, version: 1, createdAt: now, updatedAt: now })
}

/** Changes a person and counts the version on. */
export async function updatePerson(db: Db, id: string, changes: Partial<PersonRow>, now: string): Promise<void> {
  await db('people').where({ id }).update({ ...changes, version: db.raw('version + 1'), updatedAt: now })
}

/** Who holds one of these roles now and has an e-mail address. */
export async function listMailable(db: Db, roles: readonly Role[], today: string): Promise<{ id: string, email: string, language: Language }[]> {
  return db('people').whereIn('role', roles).whereNotNull('email').where(query => query.whereNull('leftOn').orWhere('leftOn', '>=', today)).orderBy('id').select('id', 'email', 'language')
}

/** The encoded password of a person, or null. */
export async function getPasswordHash(db: Db, personId: string): Promise<string | null> {
  const row = await db('signInSecrets').where({ personId }).first('passwordHash')
  return row?.passwordHash ?? null
}

const orders = { name: 'people.sortName', badge: 'people.badge', role: 'people.role', employer: 'people.employer', hiredOn: 'people.hiredOn', crew: 'crews.name', trade: 'people.trade' } as const

/** A page of the people that the reach covers: their crew is led, they are rostered at a led site today, or it is oneself. */
export async function listPeople(db: Db, options: { query: PeopleQuery, reach: Reach, selfId: string, today: string }): Promise<{ items: Person[], total: number }> {
  const { query, reach, selfId, today } = options
  const rostered = reach.siteIds === 'all' && !query.site ? [] : await listRoster(db, { date: today })
  const idsAt = (isHere: (siteId: string) => boolean) => rostered.filter(person => isHere(person.siteId)).map(person => person.id)
  const { siteIds, crewIds } = reach
  const chosen = withSignIn(db).leftJoin('crews', 'crews.id', 'people.crewId')
  if (siteIds !== 'all') chosen.where(any => any.whereIn('people.crewId', crewIds === 'all' ? [] : [...crewIds]).orWhereIn('people.id', [selfId, ...idsAt(id => siteIds.has(id))]))
  if (query.site) chosen.whereIn('people.id', idsAt(id => id === query.site))
  if (query.crew) chosen.where('people.crewId', query.crew)
  if (query.role) chosen.where('people.role', query.role)
  if (query.q) chosen.whereRaw('instr(lower(people.name || \' \' || people.sort_name || \' \' || people.badge || \' \' || coalesce(people.email, \'\')), lower(?)) > 0', [query.q])
  if (query.employed === true) chosen.where('people.hiredOn', '<=', today).where(any => any.whereNull('people.leftOn').orWhere('people.leftOn', '>', today))
  if (query.employed === false) chosen.where(any => any.where('people.hiredOn', '>', today).orWhere('people.leftOn', '<=', today))
  const counted = await chosen.clone().count({ total: '*' }).first()
  const order = query.sort.startsWith('-') ? 'desc' : 'asc'
  const column = orders[query.sort.replace('-', '') as keyof typeof orders]
  const rows: StoredPerson[] = await chosen.orderBy([{ column, order }, { column: 'people.sortName' }, { column: 'people.id' }])
    .limit(query.perPage).offset((query.page - 1) * query.perPage).select(...columns, 'signInSecrets.firstUsedAt')
  return { items: rows.map(toPerson), total: Number(counted?.total ?? 0) }
}
