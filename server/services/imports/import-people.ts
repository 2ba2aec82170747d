import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { isGuardedRole } from '#shared/access/abilities'
import { sortNameOf } from '#shared/domain/names'
import { employerKinds, roles, type Role } from '#shared/domain/states'
import { email, line } from '#shared/schemas/common'
import type { ImportAnswer, ImportQuery } from '#shared/schemas/imports'
import { appendAudit } from '../../data/audit'
import { insertImportedPeople, listImportedPeople, listPlaceNames, updateImportedPerson, type ImportedPerson } from '../../data/imports'
import type { Work } from '../work'
import { mapColumns, nameCells, peopleColumns, type NamedRow } from './columns'
import { dateCell, gather, readRow, requireWhole, type Judged } from './import-run'
import { readTable } from './read-table'

const roleWords: Record<string, Role> = { trabajador: 'worker', hand: 'worker', installer: 'worker', mayordomo: 'foreman', superintendente: 'superintendent' }
const kindWords: Record<string, string> = { propio: 'own', temporal: 'temp', subcontractor: 'sub', subcontratista: 'sub', visitante: 'visitor' }
const languageWords: Record<string, string> = { english: 'en', inglés: 'en', ingles: 'en', spanish: 'es', español: 'es', espanol: 'es' }
const word = (words: Record<string, string>) => (text: string) => words[text.toLowerCase()] ?? text.toLowerCase()

const personRow = (order: ImportQuery['dateOrder']) => z.object({
  name: line(120).optional(),
  badge: line(40).optional(),
  email: email.optional(),
  phone: line(40).optional(),
  role: z.string().transform(word(roleWords)).pipe(z.enum(roles, 'is not a role')).optional(),
  language: z.string().transform(word(languageWords)).pipe(z.enum(['en', 'es'], 'must be en or es')).optional(),
  employer: line(120).optional(),
  employerKind: z.string().transform(word(kindWords)).pipe(z.enum(employerKinds, 'must be own, temp, sub or visitor')).optional(),
  trade: line(80).optional(),
  hiredOn: dateCell(order).optional(),
  leftOn: dateCell(order).optional(),
  crew: line(120).optional(),
})
type PersonRow = z.infer<ReturnType<typeof personRow>>

type Plan = { kind: 'create', person: ImportedPerson } | { kind: 'update', id: string, before: Partial<ImportedPerson>, changes: Partial<ImportedPerson> }

interface Known { work: Work, byBadge: Map<string, ImportedPerson>, byEmail: Map<string, ImportedPerson>, crews: Map<string, string>, seen: Set<string> }

const wrong = (field: string, why: string) => ({ field, why })

/** The person that a row speaks of, by badge or e-mail; a reason when the two name different people. */
function matchOf({ byBadge, byEmail }: Known, row: PersonRow): { match?: ImportedPerson } | { field: string, why: string } {
  const [one, other] = [row.badge && byBadge.get(row.badge.toLowerCase()), row.email && byEmail.get(row.email)]
  if (one && other && one.id !== other.id) return wrong('email', 'belongs to another badge')
  return { match: one || other || undefined }
}

/** A file never makes a manager, changes a manager's role, or one's own. */
function roleProblem(known: Known, row: PersonRow, match?: ImportedPerson) {
  if (!row.role || row.role === match?.role) return null
  if (isGuardedRole(row.role) || (match && isGuardedRole(match.role))) return wrong('role', 'is given on the person\'s own page, with the password')
  return match?.id === known.work.actor.personId ? wrong('role', 'nobody changes their own role') : null
}

function isRepeated({ seen }: Known, row: PersonRow): boolean {
  const keys = [...(row.badge ? [`badge ${row.badge.toLowerCase()}`] : []), ...(row.email ? [`email ${row.email}`] : [])]
  const isSeen = keys.some(key => seen.has(key))
  for (const key of keys) seen.add(key)
  return isSeen
}

function toNewPerson({ work }: Known, row: PersonRow, crewId: string | null): ImportedPerson | { field: string, why: string } {
  if (!row.name) return wrong('name', 'is needed for a new person')
  if (!row.badge) return wrong('badge', 'is needed for a new person')
  return {
    id: randomUUID(), name: row.name, sortName: sortNameOf(row.name), badge: row.badge, email: row.email ?? null, phone: row.phone ?? null,
    role: row.role ?? 'worker', language: row.language ?? work.company.language, employer: row.employer ?? work.company.name, employerKind: row.employerKind ?? 'own',
    trade: row.trade ?? null, hiredOn: row.hiredOn ?? work.today, leftOn: row.leftOn ?? null, crewId,
  }
}

function toChanges(match: ImportedPerson, row: PersonRow, crewId: string | null): Judged<Plan> {
  const { crew: _crew, ...given } = row
  const isSameBadge = row.badge?.toLowerCase() === match.badge.toLowerCase()
  const wanted: Partial<ImportedPerson> = { ...given, ...(isSameBadge && { badge: match.badge }), ...(row.name && row.name !== match.name && { sortName: sortNameOf(row.name) }), ...(crewId && { crewId }) }
  const changed = Object.entries(wanted).filter(([field, value]) => value !== undefined && value !== match[field as keyof ImportedPerson])
  if (changed.length === 0) return { unchanged: true }
  const before = Object.fromEntries(changed.map(([field]) => [field, match[field as keyof ImportedPerson]]))
  return { plan: { kind: 'update', id: match.id, before, changes: Object.fromEntries(changed) } }
}

function judge(known: Known, row: PersonRow): Judged<Plan> {
  if (isRepeated(known, row)) return wrong('badge', 'the same person stands in the file before')
  const found = matchOf(known, row)
  if ('why' in found) return found
  const crewId = row.crew ? known.crews.get(row.crew.toLowerCase()) ?? null : null
  if (row.crew && !crewId) return wrong('crew', 'is not a crew')
  const problem = roleProblem(known, row, found.match)
  if (problem) return problem
  const [hired, left] = [row.hiredOn ?? found.match?.hiredOn ?? known.work.today, row.leftOn ?? found.match?.leftOn]
  if (left && left < hired) return wrong('leftOn', 'is before the first day')
  if (found.match) return toChanges(found.match, row, crewId)
  const person = toNewPerson(known, row, crewId)
  return 'why' in person ? person : { plan: { kind: 'create', person } }
}

async function knownTo(work: Work): Promise<Known> {
  const people = await listImportedPeople(work.db)
  const { crews } = await listPlaceNames(work.db)
  return {
    work, seen: new Set(),
    byBadge: new Map(people.map(person => [person.badge.toLowerCase(), person])),
    byEmail: new Map(people.flatMap(person => (person.email ? [[person.email.toLowerCase(), person]] : []))),
    crews: new Map(crews.map(crew => [crew.name.toLowerCase(), crew.id])),
  }
}

async function save(work: Work, plans: Plan[]): Promise<void> {
  const created = plans.flatMap(plan => (plan.kind === 'create' ? [plan.person] : []))
  const updated = plans.flatMap(plan => (plan.kind === 'update' ? [plan] : []))
  await work.db.transaction(async (trx) => {
    for (const { id, changes } of updated) await updateImportedPerson(trx, id, changes, work.now)
    await insertImportedPeople(trx, created, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'import.people', subject: { kind: 'company', id: '1' }, before: updated.map(({ id, before }) => ({ id, ...before })), after: { created, updated: updated.map(({ id, changes }) => ({ id, ...changes })) } })
  })
}

/**
 * Takes people from a CSV or XLSX. A row is matched by badge or e-mail; empty cells change nothing; what a new person
 * lacks is filled in (worker, the company itself, its language, hired today). All rows or none, unless rejected ones may be skipped.
 */
export async function importPeople(work: Work, bytes: Buffer, query: ImportQuery): Promise<ImportAnswer> {
  const table = await readTable(bytes)
  const mapping = mapColumns(table.header, peopleColumns, [['badge', 'email']])
  const known = await knownTo(work)
  const schema = personRow(query.dateOrder)
  const { plans, rejected, unchanged } = gather(nameCells(table, mapping), (row: NamedRow): Judged<Plan> => {
    const read = readRow(schema, row)
    return 'value' in read ? judge(known, read.value) : read
  })
  const created = plans.filter(plan => plan.kind === 'create').length
  const answer: ImportAnswer = { rows: table.rows.length, created, updated: plans.length - created, unchanged, rejected, mapping, asksDateOrder: rejected.some(row => row.why.startsWith('could be two dates')) }
  requireWhole(answer, query)
  if (!query.dryRun && plans.length > 0) await save(work, plans)
  return answer
}
