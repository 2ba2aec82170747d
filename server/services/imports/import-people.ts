import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { isGuardedRole } from '#shared/access/abilities'
import { sortNameOf } from '#shared/domain/names'
import { employerKinds, roles, type Role } from '#shared/domain/states'
import { email, line } from '#shared/schemas/common'
import type { ImportAnswer, ImportQuery } from '#shared/schemas/imports'
import { appendAudit } from '../../data/audit'
import { insertImportedPerson, listImportedPeople, listPlaceNames, updateImportedPerson, type ImportedPerson } from '../../data/imports'
import type { Work } from '../work'
import { peopleColumns } from './columns'
import { dateCell, openImport, readRow, runImport, wrong, type Judged, type Wrong } from './import-run'
import type { Tell } from './progress'

const roleWords: Record<string, Role> = { trabajador: 'worker', hand: 'worker', installer: 'worker', mayordomo: 'foreman', superintendente: 'superintendent' }
const kindWords: Record<string, string> = { propio: 'own', temporal: 'temp', subcontractor: 'sub', subcontratista: 'sub', visitante: 'visitor' }
const languageWords: Record<string, string> = { english: 'en', inglés: 'en', ingles: 'en', spanish: 'es', español: 'es', espanol: 'es' }
const word = (words: Record<string, string>) => (text: string) => words[text.toLowerCase()] ?? text.toLowerCase()

const personRow = (order: ImportQuery['dateOrder']) => z.object({
  name: line(120).optional(),
  badge: line(40).optional(),
  email: email.optional(),
  phone: line(40).optional(),
  role: z.string().transform(word(roleWords)).pipe(z.enum(roles, 'notARole')).optional(),
  language: z.string().transform(word(languageWords)).pipe(z.enum(['en', 'es'], 'notALanguage')).optional(),
  employer: line(120).optional(),
  employerKind: z.string().transform(word(kindWords)).pipe(z.enum(employerKinds, 'notAnEmployerKind')).optional(),
  trade: line(80).optional(),
  hiredOn: dateCell(order).optional(),
  leftOn: dateCell(order).optional(),
  crew: line(120).optional(),
})
type PersonRow = z.infer<ReturnType<typeof personRow>>

type Plan = { kind: 'create', person: ImportedPerson } | { kind: 'update', id: string, before: Partial<ImportedPerson>, changes: Partial<ImportedPerson> }

interface Known { work: Work, byBadge: Map<string, ImportedPerson>, byEmail: Map<string, ImportedPerson>, crews: Map<string, string>, seen: Set<string> }

/** The person that a row speaks of, by badge or e-mail; a reason when the two name different people. */
function matchOf({ byBadge, byEmail }: Known, row: PersonRow): { match?: ImportedPerson } | Wrong {
  const [one, other] = [row.badge && byBadge.get(row.badge.toLowerCase()), row.email && byEmail.get(row.email)]
  if (one && other && one.id !== other.id) return wrong('email', 'otherBadge')
  return { match: one || other || undefined }
}

/** A file never makes a manager, changes a manager's role, or one's own. */
function roleProblem(known: Known, row: PersonRow, match?: ImportedPerson) {
  if (!row.role || row.role === match?.role) return null
  if (isGuardedRole(row.role) || (match && isGuardedRole(match.role))) return wrong('role', 'guardedRole')
  return match?.id === known.work.actor.personId ? wrong('role', 'ownRole') : null
}

function isRepeated({ seen }: Known, row: PersonRow): boolean {
  const keys = [...(row.badge ? [`badge ${row.badge.toLowerCase()}`] : []), ...(row.email ? [`email ${row.email}`] : [])]
  const isSeen = keys.some(key => seen.has(key))
  for (const key of keys) seen.add(key)
  return isSeen
}

function toNewPerson({ work }: Known, row: PersonRow, crewId: string | null): ImportedPerson | Wrong {
  if (!row.name) return wrong('name', 'nameNeeded')
  if (!row.badge) return wrong('badge', 'badgeNeeded')
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
  if (isRepeated(known, row)) return wrong('badge', 'personTwice')
  const found = matchOf(known, row)
  if ('code' in found) return found
  const crewId = row.crew ? known.crews.get(row.crew.toLowerCase()) ?? null : null
  if (row.crew && !crewId) return wrong('crew', 'unknownCrew')
  const problem = roleProblem(known, row, found.match)
  if (problem) return problem
  const [hired, left] = [row.hiredOn ?? found.match?.hiredOn ?? known.work.today, row.leftOn ?? found.match?.leftOn]
  if (left && left < hired) return wrong('leftOn', 'leftBeforeHired')
  if (found.match) return toChanges(found.match, row, crewId)
  const person = toNewPerson(known, row, crewId)
  return 'code' in person ? person : { plan: { kind: 'create', person } }
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

async function save(work: Work, plans: Plan[], tell: Tell): Promise<void> {
  const created = plans.flatMap(plan => (plan.kind === 'create' ? [plan.person] : []))
  const updated = plans.flatMap(plan => (plan.kind === 'update' ? [plan] : []))
  await work.db.transaction(async (trx) => {
    for (const [index, plan] of plans.entries()) {
      if (plan.kind === 'update') await updateImportedPerson(trx, plan.id, plan.changes, work.now)
      else await insertImportedPerson(trx, plan.person, work.now)
      await tell('saving', index + 1, plans.length)
    }
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'import.people', subject: { kind: 'company', id: '1' }, before: updated.map(({ id, before }) => ({ id, ...before })), after: { created, updated: updated.map(({ id, changes }) => ({ id, ...changes })) } })
  })
}

/**
 * Takes people from a CSV or XLSX. A row is matched by badge or e-mail; empty cells change nothing; what a new person
 * lacks is filled in (worker, the company itself, its language, hired today). All rows or none, unless rejected ones may be skipped.
 */
export async function importPeople(work: Work, bytes: Buffer, query: ImportQuery): Promise<ImportAnswer> {
  const kind = { kind: 'people' as const, meanings: { synonyms: peopleColumns, needed: [['badge', 'email']] } }
  const table = await openImport(work, bytes, query, kind)
  const known = await knownTo(work)
  const schema = personRow(query.dateOrder)
  return runImport<Plan>(work, table, query, {
    ...kind,
    judge: (row) => {
      const read = readRow(schema, row)
      return 'value' in read ? judge(known, read.value) : read
    },
    isNew: plan => plan.kind === 'create',
    save: (plans, tell) => save(work, plans, tell),
  })
}
