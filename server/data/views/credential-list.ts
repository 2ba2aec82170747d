import type { CredentialState } from '#shared/domain/states'
import { daysLeft } from '#shared/domain/validity'
import { parseCalendarDate } from '#shared/domain/dates'
import type { CredentialItem } from '#shared/schemas/credentials'
import type { Db } from '../database'
import { credentialSql, type CredentialSql } from './credential-sql'

/** Whose credentials a reader may see. */
export type CredentialScope = { all: true } | { all: false, personId: string, crewIds: string[] }

/** What a list is narrowed to; `siteToday` is the date at the site that `siteId` names. */
export interface CredentialQuery {
  scope: CredentialScope
  today: string
  states?: CredentialState[]
  /** Expiring from today to today + this many days, of people now employed, effective ones only. */
  within?: number
  includeExpired?: boolean
  siteId?: string
  siteToday?: string
  crewId?: string
  type?: string
  personId?: string
  ids?: readonly string[]
  isEffective?: boolean
  q?: string
  sort?: string
}

const sortColumns: Record<string, string[]> = {
  person: ['sort_name', 'type_name', 'expires_on'],
  credential: ['type_name', 'sort_name'],
  state: ['state', 'expires_on', 'sort_name'],
  expiresOn: ['expires_on', 'sort_name', 'type_name'],
  issuedOn: ['issued_on', 'sort_name'],
  basis: ['basis', 'expires_on', 'sort_name'],
}

/** What never expires stands last whichever way the list is sorted. */
function orderOf(sort: string): string {
  const isDown = sort.startsWith('-')
  const columns = sortColumns[sort.replace('-', '')] ?? sortColumns.person!
  return [...columns, 'id'].map((column, index) => `${column}${column === 'sort_name' || column === 'type_name' ? ' collate nocase' : ''} ${isDown && index === 0 ? 'desc' : 'asc'} nulls last`).join(', ')
}

const likeOf = (q: string) => `%${q.replace(/[\\%_]/g, sign => `\\${sign}`)}%`

function narrow(db: Db, sql: CredentialSql, query: CredentialQuery) {
  const { scope } = query
  const list = db('credentials as c')
    .join('credentialTypes as t', 't.id', 'c.typeId')
    .join('people as p', 'p.id', 'c.personId')
    .leftJoin('crews as w', 'w.id', 'p.crewId')
    .leftJoin('sites as s', 's.id', 'c.siteId')
  if (!scope.all) list.where(own => own.where('c.personId', scope.personId).orWhereIn('p.crewId', scope.crewIds))
  if (query.ids) list.whereRaw('c.id in (select value from json_each(?))', [JSON.stringify(query.ids)])
  if (query.personId) list.where('c.personId', query.personId)
  if (query.crewId) list.where('p.crewId', query.crewId)
  if (query.type) list.where('t.code', query.type)
  if (query.siteId) list.whereRaw(sql.isRosteredAt, { site: query.siteId, day: query.siteToday ?? query.today })
  if (query.q) list.whereRaw(`(p.name like :q escape '\\' or p.sort_name like :q escape '\\' or p.badge like :q escape '\\' or t.name_en like :q escape '\\' or t.name_es like :q escape '\\' or c.number like :q escape '\\' or c.issuer like :q escape '\\')`, { q: likeOf(query.q) })
  if (query.states) list.whereRaw(`${sql.state} in (${query.states.map(() => '?').join(',')})`, query.states)
  if (query.within !== undefined) {
    list.whereRaw(sql.isEmployed).whereRaw(sql.mayExpireBy(query.within)).whereRaw(sql.isStanding)
    list.whereRaw(sql.expires('c') + sql.isWithin(query.within, query.includeExpired ?? false))
  }
  else if (query.isEffective) {
    list.whereRaw(sql.isEffective)
  }
  return list
}

interface ListRow extends Omit<CredentialItem, 'typeName' | 'details' | 'number' | 'issuer' | 'siteId' | 'site' | 'fileId' | 'daysLeft'> {
  nameEn: string
  nameEs: string
  number: string | null
  issuer: string | null
  siteId: string | null
  site: string | null
  fileId: string | null
  details: string | null
}

function toItem(row: ListRow, today: string): CredentialItem {
  const { nameEn, nameEs, number, issuer, siteId, site, fileId, details } = row
  return {
    id: row.id, personId: row.personId, person: row.person, sortName: row.sortName, badge: row.badge, employer: row.employer, crew: row.crew,
    type: row.type, typeName: { en: nameEn, es: nameEs }, module: row.module, basis: row.basis, source: row.source,
    issuedOn: row.issuedOn, expiresOn: row.expiresOn, daysLeft: daysLeft(row.expiresOn, today), state: row.state,
    ...(number !== null && { number }), ...(issuer !== null && { issuer }), ...(siteId !== null && { siteId }), ...(site !== null && { site }),
    ...(fileId !== null && { fileId }), ...(details !== null && { details: JSON.parse(details) as CredentialItem['details'] }),
  }
}

const columnsOf = (db: Db, sql: CredentialSql, language: 'en' | 'es') => [
  'c.id', 'c.personId', 'p.name as person', 'p.sortName', 'p.badge', 'p.employer', 'w.name as crew',
  't.code as type', 't.nameEn', 't.nameEs', 't.module', 't.basis', 't.source', 'c.issuedOn', 'c.number', 'c.issuer',
  'c.siteId', 's.name as site', 'c.fileId', 'c.details',
  db.raw(`${sql.expires('c')} as expires_on`), db.raw(`${sql.state} as state`), db.raw(`t.name_${language} as type_name`),
]

function listed(db: Db, query: CredentialQuery, language: 'en' | 'es') {
  const sql = credentialSql(parseCalendarDate(query.today))
  const rows = narrow(db, sql, query).select(columnsOf(db, sql, language))
  return db.withMaterialized('asked', db.raw(sql.asked)).withMaterialized('limited', db.raw(sql.limited)).with('listed', rows).from('listed')
}

/** One page of a list, in the order asked for (by person, or by expiry with `within`), and how many there are in all. */
export async function listCredentials(db: Db, query: CredentialQuery, options: { language: 'en' | 'es', limit: number, offset: number }): Promise<{ items: CredentialItem[], total: number }> {
  const sort = query.sort ?? (query.within === undefined ? 'person' : 'expiresOn')
  const rows: ListRow[] = await listed(db, query, options.language).select('*').orderByRaw(orderOf(sort)).limit(options.limit).offset(options.offset)
  const isWhole = options.offset === 0 && rows.length < options.limit
  return { items: rows.map(row => toItem(row, query.today)), total: isWhole ? rows.length : await countCredentials(db, query) }
}

/** How many credentials the filters leave. */
export async function countCredentials(db: Db, query: CredentialQuery): Promise<number> {
  const sql = credentialSql(parseCalendarDate(query.today))
  const [row] = await db.withMaterialized('asked', db.raw(sql.asked)).withMaterialized('limited', db.raw(sql.limited)).with('counted', narrow(db, sql, query).count({ total: '*' })).from('counted').select('total')
  return Number(row.total)
}

/** The ids of the whole filtered list in its order, so that an export can walk it in pieces. */
export async function listCredentialIds(db: Db, query: CredentialQuery, language: 'en' | 'es'): Promise<string[]> {
  const sort = query.sort ?? (query.within === undefined ? 'person' : 'expiresOn')
  return listed(db, query, language).orderByRaw(orderOf(sort)).pluck('id')
}

/** Lines with these ids: their plain columns, and state and last good day worked out once for each. */
async function readByIds<Row extends { id: string }>(db: Db, ids: readonly string[], today: string, columns: Record<string, string>): Promise<Row[]> {
  const sql = credentialSql(parseCalendarDate(today))
  const facts = narrow(db, sql, { scope: { all: true }, today, ids }).select([
    ...Object.entries(columns).map(([name, column]) => `${column} as ${name}`), 'c.verification', 'c.withdrawnOn', 't.leadDays',
    db.raw(`${sql.starts('c')} as starts_on`), db.raw(`${sql.expires('c')} as expires_on`),
  ])
  const rows = await db.withMaterialized('asked', db.raw(sql.asked)).withMaterialized('limited', db.raw(sql.limited)).withMaterialized('facts', facts)
    .from('facts as f').select([...Object.keys(columns), 'expiresOn', db.raw(`${sql.stateOfFacts} as state`)]) as unknown as Row[]
  const byId = new Map(rows.map(row => [row.id, row]))
  return ids.flatMap(id => byId.get(id) ?? [])
}

const itemColumns = {
  id: 'c.id', personId: 'c.personId', person: 'p.name', sortName: 'p.sortName', badge: 'p.badge', employer: 'p.employer', crew: 'w.name', type: 't.code', nameEn: 't.nameEn', nameEs: 't.nameEs', module: 't.module',
  basis: 't.basis', source: 't.source', issuedOn: 'c.issuedOn', number: 'c.number', issuer: 'c.issuer', siteId: 'c.siteId', site: 's.name', fileId: 'c.fileId', details: 'c.details',
}

/** The credentials with these ids as lines, in the order of the ids. */
export async function listCredentialsByIds(db: Db, ids: readonly string[], today: string): Promise<CredentialItem[]> {
  return (await readByIds<ListRow>(db, ids, today, itemColumns)).map(row => toItem(row, today))
}

/** What an exported list says of a credential, in one language. */
export interface CredentialLine {
  id: string
  person: string
  badge: string
  employer: string
  crew: string | null
  typeName: string
  number: string | null
  issuer: string | null
  source: string
  issuedOn: string
  expiresOn: string | null
  state: CredentialState
}

/** The same for an export: only what its columns show, in one language. */
export const listCredentialLines = (db: Db, ids: readonly string[], { today, language }: { today: string, language: 'en' | 'es' }): Promise<CredentialLine[]> =>
  readByIds<CredentialLine>(db, ids, today, { id: 'c.id', person: 'p.name', badge: 'p.badge', employer: 'p.employer', crew: 'w.name', typeName: language === 'es' ? 't.nameEs' : 't.nameEn', number: 'c.number', issuer: 'c.issuer', source: 't.source', issuedOn: 'c.issuedOn' })

/** How many of the filtered list expire on each day. */
export async function countByExpiry(db: Db, query: CredentialQuery): Promise<{ date: string, count: number }[]> {
  const rows = await listed(db, query, 'en').whereNotNull('expiresOn').groupBy('expiresOn').orderBy('expiresOn').select('expiresOn').count({ count: '*' })
  return rows.map(row => ({ date: row.expiresOn as string, count: Number(row.count) }))
}
