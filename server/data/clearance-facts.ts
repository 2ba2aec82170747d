import type { Knex } from 'knex'
import type { ClearanceDuty, ClearancePerson, Hold } from '#shared/domain/clearance'
import { addDays, dateInZone } from '#shared/domain/dates'
import type { Learning } from '#shared/domain/missing'
import type { Rule, RuleScope } from '#shared/domain/rules'
import type { Credential, CredentialType, Validity } from '#shared/domain/validity'
import type { Db } from './database'

/** Every duty, in the order of the wall, as the rules need it. */
export async function listClearanceDuties(db: Db): Promise<ClearanceDuty[]> {
  const rows = await db('duties').orderBy(['position', 'code']).select('code', 'learningBeside', 'recencyMonths')
  return rows.map(row => ({ code: row.code, learningBeside: row.learningBeside === 1, recencyMonths: row.recencyMonths }))
}

/** Every credential type by code, as the rules need it. */
export async function mapClearanceTypes(db: Db): Promise<Map<string, CredentialType>> {
  const rows = await db('credentialTypes').select('code', 'validityKind', 'months', 'anchor', 'basis', 'leadDays', 'perSite', 'module')
  return new Map(rows.map(row => [row.code as string, { code: row.code, validity: toValidity(row), basis: row.basis, leadDays: row.leadDays, perSite: row.perSite === 1, module: row.module }]))
}

/** A type's validity from its three columns. */
export function toValidity(row: { validityKind: Validity['kind'], months: number | null, anchor: 'day' | 'monthEnd' | null }): Validity {
  return row.validityKind === 'period' ? { kind: 'period', months: row.months ?? 0, anchor: row.anchor ?? 'day' } : { kind: row.validityKind }
}

/** Every rule with its groups of type codes, in the order in which they were made. */
export async function listRules(db: Db, id?: string): Promise<Rule[]> {
  const rows = await db('rules').leftJoin('duties', 'duties.id', 'rules.dutyId')
    .where(query => id === undefined || query.where('rules.id', id))
    .orderBy(['rules.createdAt', 'duties.position', 'rules.id']).select('rules.id', 'rules.siteId', 'duties.code as duty')
  const types = await db('ruleTypes').join('credentialTypes', 'credentialTypes.id', 'ruleTypes.typeId')
    .where(query => id === undefined || query.where('ruleTypes.ruleId', id))
    .orderBy(['ruleTypes.ruleId', 'ruleTypes.groupNumber', 'credentialTypes.code']).select('ruleTypes.ruleId', 'ruleTypes.groupNumber', 'credentialTypes.code')
  const groups = new Map<string, Map<number, string[]>>()
  for (const { ruleId, groupNumber, code } of types) {
    const ofRule = groups.get(ruleId) ?? new Map<number, string[]>()
    groups.set(ruleId, ofRule.set(groupNumber, [...ofRule.get(groupNumber) ?? [], code]))
  }
  return rows.map(row => ({ id: row.id, appliesTo: toScope(row.duty, row.siteId), groups: [...groups.get(row.id)?.values() ?? []] }))
}

function toScope(duty: string | null, site: string | null): RuleScope {
  if (duty && site) return { duty, site }
  if (duty) return { duty }
  return site ? { site } : { everybody: true }
}

/** The people whose facts are asked for: some ids, or all of the company. */
export type Whom = readonly string[] | 'all'

/** Narrows a query to them; any number of ids is one binding, where a list of them would meet SQLite's limit. */
const only = (whom: Whom, column: string) => (query: Knex.QueryBuilder) => whom === 'all' ? query : query.whereRaw(`?? in (select value from json_each(?))`, [column, JSON.stringify(whom)])

const byPerson = <Row>(rows: readonly (Row & { personId: string })[]): Map<string, Row[]> => {
  const found = new Map<string, Row[]>()
  for (const row of rows) {
    const list = found.get(row.personId)
    if (list) list.push(row)
    else found.set(row.personId, [row])
  }
  return found
}

/** Employment and the hidden age limit, by person. */
export async function mapClearancePeople(db: Db, whom: Whom): Promise<Map<string, ClearancePerson>> {
  const rows: ClearancePerson[] = await db('people').modify(only(whom, 'id')).select('id', 'hiredOn', 'leftOn', 'under18Until')
  return new Map(rows.map(row => [row.id, row]))
}

/** Every credential of these people, rejected and withdrawn ones too, by person. */
export async function mapCredentials(db: Db, whom: Whom): Promise<Map<string, Credential[]>> {
  const rows: (Credential & { personId: string, details: string | null })[] = await db('credentials').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId')
    .modify(only(whom, 'credentials.personId'))
    .select('credentials.id', 'credentials.personId', 'credentialTypes.code as type', 'credentials.issuedOn', 'credentials.expiresOn', 'credentials.verification', 'credentials.withdrawnOn', 'credentials.siteId', 'credentials.details')
  for (const row of rows) row.judgedOn = row.details ? (JSON.parse(row.details) as { judgedOn?: string }).judgedOn : null
  return byPerson<Credential>(rows)
}

/** Holds of these people, ended ones too, by person; their reasons stay in the database. */
export async function mapHolds(db: Db, whom: Whom): Promise<Map<string, Hold[]>> {
  const rows = await db('holds').modify(only(whom, 'personId')).select('personId', 'startsOn as from', 'endsOn as to')
  return byPerson<Hold>(rows)
}

/** The last recorded day on or before a date of doing each duty: by person, then by the duty's code. */
export async function mapLastDutyDays(db: Db, whom: Whom, date: string): Promise<Map<string, Map<string, string>>> {
  const rows = await db('dutyDays').join('duties', 'duties.id', 'dutyDays.dutyId').where('doneOn', '<=', date)
    .modify(only(whom, 'personId'))
    .groupBy('personId', 'duties.code').select('personId', 'duties.code').max('doneOn as lastDoneOn')
  const found = new Map<string, Map<string, string>>()
  for (const row of rows as unknown as { personId: string, code: string, lastDoneOn: string }[]) {
    found.set(row.personId, (found.get(row.personId) ?? new Map<string, string>()).set(row.code, row.lastDoneOn))
  }
  return found
}

/**
 * The day, in the company's zone, on which each module's quiz was last passed, and the next day, from `date` on, for which
 * practice is booked (a seat in a session of that module): by person, then by module.
 */
export async function mapLearning(db: Db, whom: Whom, { timeZone, date }: { timeZone: string, date: string }): Promise<Map<string, Map<string, Learning>>> {
  const passed: { personId: string, module: string, submittedAt: string }[] = await db('attempts').where({ passed: true }).modify(only(whom, 'personId'))
    .groupBy('personId', 'module').select('personId', 'module').max('submittedAt as submittedAt')
  const booked: { personId: string, module: string, startsAt: string, siteZone: string }[] = await db('renewalSeats').join('renewalRounds', 'renewalRounds.id', 'renewalSeats.roundId')
    .join('credentialTypes', 'credentialTypes.id', 'renewalRounds.typeId').join('sites', 'sites.id', 'renewalRounds.siteId').whereNotNull('credentialTypes.module')
    .whereIn('renewalSeats.state', ['invited', 'present']).whereIn('renewalRounds.state', ['planned', 'held']).where('renewalRounds.startsAt', '>=', addDays(date, -1)).modify(only(whom, 'renewalSeats.personId'))
    .orderBy('renewalRounds.startsAt').select('renewalSeats.personId', 'credentialTypes.module', 'renewalRounds.startsAt', 'sites.timeZone as siteZone')
  const found = new Map<string, Map<string, Learning>>()
  const note = (personId: string, module: string, learned: Learning) => {
    const known = found.get(personId) ?? new Map<string, Learning>()
    found.set(personId, known.set(module, { ...learned, ...known.get(module) }))
  }
  for (const row of passed) note(row.personId, row.module, { passedOn: dateInZone(row.submittedAt, timeZone) })
  for (const row of booked) {
    const day = dateInZone(row.startsAt, row.siteZone)
    if (day >= date) note(row.personId, row.module, { practiceFrom: day, practiceTo: day })
  }
  return found
}
