import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { expiryOf, printedDateProblem, type PrintedDateProblem } from '#shared/domain/validity'
import { email, line, text } from '#shared/schemas/common'
import type { ImportAnswer, ImportQuery } from '#shared/schemas/imports'
import { appendAudit } from '../../data/audit'
import { insertCredential, listStoredTypes, updateCredential, type StoredType } from '../../data/credentials'
import { listHeldCredentials, listImportedPeople, listPlaceNames, type HeldCredential } from '../../data/imports'
import { randomCode } from '../hashing'
import type { Work } from '../work'
import { credentialColumns } from './columns'
import { dateCell, openImport, readRow, runImport, wrong, type Judged, type Reason, type Wrong } from './import-run'
import type { Tell } from './progress'

const credentialRow = (order: ImportQuery['dateOrder']) => z.object({
  badge: line(40).optional(),
  email: email.optional(),
  type: line(120),
  issuedOn: dateCell(order),
  expiresOn: dateCell(order).optional(),
  number: text(100).optional(),
  issuer: text(200).optional(),
  site: line(120).optional(),
})
type CredentialRow = z.infer<ReturnType<typeof credentialRow>>

interface NewHeld { id: string, personId: string, typeId: string, issuedOn: string, expiresOn: string | null, number: string | null, issuer: string | null, siteId: string | null }
type Plan = { kind: 'create', credential: NewHeld } | { kind: 'update', id: string, changes: { expiresOn: string | null, number: string | null, issuer: string | null } }

interface Known { people: Map<string, string>, types: Map<string, StoredType>, sites: Map<string, string>, held: Map<string, HeldCredential>, seen: Set<string> }

const keyOf = (held: Pick<NewHeld, 'personId' | 'typeId' | 'issuedOn' | 'siteId'>) => [held.personId, held.typeId, held.issuedOn, held.siteId ?? ''].join('/')

function personOf({ people }: Known, row: CredentialRow): string | Wrong {
  const [one, other] = [row.badge && people.get(`badge ${row.badge.toLowerCase()}`), row.email && people.get(`email ${row.email}`)]
  if (!row.badge && !row.email) return wrong('badge', 'personNeeded')
  if (row.badge && !one) return wrong('badge', 'nobody')
  if (row.email && !other) return wrong('email', 'nobody')
  if (one && other && one !== other) return wrong('email', 'otherBadge')
  return (one || other)!
}

const printedReasons: Record<PrintedDateProblem, Reason> = { needed: 'printedNeeded', refused: 'printedRefused', notADate: 'notADate', beforeIssue: 'expiresBeforeIssue' }

function judge(known: Known, row: CredentialRow): Judged<Plan> {
  const personId = personOf(known, row)
  if (typeof personId !== 'string') return personId
  const type = known.types.get(row.type.toLowerCase())
  if (!type) return wrong('type', 'unknownType')
  if (type.module) return wrong('type', 'byModuleOnly')
  const siteId = row.site ? known.sites.get(row.site.toLowerCase()) ?? null : null
  if (row.site && !siteId) return wrong('site', 'unknownSite')
  if (type.perSite && !siteId) return wrong('site', 'siteNeeded')
  const problem = printedDateProblem(type.validity, row.issuedOn, row.expiresOn)
  if (problem) return wrong('expiresOn', printedReasons[problem])
  const credential: NewHeld = { id: randomUUID(), personId, typeId: type.id, issuedOn: row.issuedOn, expiresOn: expiryOf(type.validity, row.issuedOn, row.expiresOn), number: row.number ?? null, issuer: row.issuer ?? null, siteId }
  const key = keyOf(credential)
  if (known.seen.has(key)) return wrong('type', 'cardTwice')
  known.seen.add(key)
  const held = known.held.get(key)
  return held ? toUpdate(held, credential) : { plan: { kind: 'create', credential } }
}

/** A card that is there already: the same changes nothing; a waiting one takes the file's words; a judged one is not edited. */
function toUpdate(held: HeldCredential, wanted: NewHeld): Judged<Plan> {
  const changes = { expiresOn: wanted.expiresOn, number: wanted.number ?? held.number, issuer: wanted.issuer ?? held.issuer }
  if (changes.expiresOn === held.expiresOn && changes.number === held.number && changes.issuer === held.issuer) return { unchanged: true }
  if (held.verification !== 'unverified') return wrong('type', 'judgedAlready')
  return { plan: { kind: 'update', id: held.id, changes } }
}

async function knownTo(work: Work): Promise<Known> {
  const [people, types, { sites }, held] = [await listImportedPeople(work.db), await listStoredTypes(work.db), await listPlaceNames(work.db), await listHeldCredentials(work.db)]
  return {
    seen: new Set(),
    people: new Map(people.flatMap(person => [[`badge ${person.badge.toLowerCase()}`, person.id] as const, ...(person.email ? [[`email ${person.email.toLowerCase()}`, person.id] as const] : [])])),
    types: new Map(types.flatMap(type => [type.name.es, type.name.en, type.code].map(name => [name.toLowerCase(), type] as const))),
    sites: new Map(sites.flatMap(site => [site.name, site.code].map(name => [name.toLowerCase(), site.id] as const))),
    held: new Map(held.map(credential => [keyOf(credential), credential])),
  }
}

async function save(work: Work, plans: Plan[], tell: Tell): Promise<void> {
  await work.db.transaction(async (trx) => {
    for (const [index, plan] of plans.entries()) {
      if (plan.kind === 'update') await updateCredential(trx, plan.id, plan.changes)
      else await insertCredential(trx, { ...plan.credential, details: null, fileId: null, verification: 'unverified', cardCode: randomCode(), createdBy: work.actor.personId, createdAt: work.now })
      await tell('saving', index + 1, plans.length)
    }
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'import.credentials', subject: { kind: 'company', id: '1' }, after: plans })
  })
}

/** Takes outside cards from a CSV or XLSX; each waits to be verified. People by badge or e-mail, types by code or name, sites by code or name. */
export async function importCredentials(work: Work, bytes: Buffer, query: ImportQuery): Promise<ImportAnswer> {
  const kind = { kind: 'credentials' as const, meanings: { synonyms: credentialColumns, needed: [['badge', 'email'], ['type'], ['issuedOn']] } }
  const table = await openImport(work, bytes, query, kind)
  const known = await knownTo(work)
  const schema = credentialRow(query.dateOrder)
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
