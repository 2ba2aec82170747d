import { randomUUID } from 'node:crypto'
import { can } from '#shared/access/abilities'
import { dateInZone } from '#shared/domain/dates'
import { missingLegalDetails } from '#shared/domain/legal-details'
import { expiryOf, isCounting, printedDateProblem, type PrintedDateProblem } from '#shared/domain/validity'
import type { Page } from '#shared/schemas/common'
import type { CredentialFilters, CredentialItem, CredentialView, ExpiryDays, NewCredential } from '#shared/schemas/credentials'
import { appendAudit } from '../data/audit'
import { findCredential, findCredentialType, findHolder, insertCredential, namesOf, updateCredential, zoneOfSite, type StoredCredential, type StoredType } from '../data/credentials'
import type { Db } from '../data/database'
import { findFile } from '../data/files'
import { isWithin } from '../data/reach'
import { countByExpiry, listCredentials, listCredentialsByIds, type CredentialQuery, type CredentialScope } from '../data/views/credential-list'
import { randomCode } from './hashing'
import { badField, notFound, Refusal } from './refusal'
import type { Work } from './work'

/** Whose credentials the actor sees: their own, those of the crews they lead, or everybody's. */
export async function credentialScope(work: Work): Promise<CredentialScope> {
  if (can(work.actor, 'credentials.readAll')) return { all: true }
  const { crewIds } = work.actor.role === 'admin' ? { crewIds: new Set<string>() } : await work.reach()
  return { all: false, personId: work.actor.personId, crewIds: crewIds === 'all' ? [] : [...crewIds] }
}

/** The filters of an address as a query of the list, within the actor's scope. */
export async function toCredentialQuery(work: Work, filters: CredentialFilters): Promise<CredentialQuery> {
  const zone = filters.site ? await zoneOfSite(work.db, filters.site) : undefined
  return {
    scope: await credentialScope(work), today: work.today, states: filters.state, within: filters.within, includeExpired: filters.includeExpired,
    siteId: filters.site, siteToday: zone && dateInZone(work.now, zone), crewId: filters.crew, type: filters.type, personId: filters.person,
    isEffective: filters.effective, q: filters.q || undefined, sort: filters.sort,
  }
}

/** One page of the credentials that the actor may see. */
export async function readCredentials(work: Work, { page, perPage, ...filters }: CredentialFilters & { page: number, perPage: number }): Promise<Page<CredentialItem>> {
  const { items, total } = await listCredentials(work.db, await toCredentialQuery(work, filters), { language: work.actor.language, limit: perPage, offset: (page - 1) * perPage })
  return { items, total, page, perPage }
}

/** How many of the filtered credentials expire on each day. */
export async function readExpiryDays(work: Work, filters: CredentialFilters): Promise<ExpiryDays> {
  const items = await countByExpiry(work.db, await toCredentialQuery(work, filters))
  return { items, total: items.reduce((sum, day) => sum + day.count, 0), today: work.today }
}

/** True when the actor may see what this person holds. */
export async function mayReadHolder(work: Work, holder: { personId: string, crewId: string | null }): Promise<boolean> {
  const scope = await credentialScope(work)
  return scope.all || holder.personId === scope.personId || (holder.crewId !== null && scope.crewIds.includes(holder.crewId))
}

/** The credential when the actor may see it; otherwise 404. */
export async function requireCredential(work: Work, id: string): Promise<{ stored: StoredCredential, item: CredentialItem }> {
  const stored = await findCredential(work.db, id)
  const holder = stored && await findHolder(work.db, stored.personId)
  if (!stored || !holder || !await mayReadHolder(work, { personId: holder.id, crewId: holder.crewId })) throw notFound('credential')
  const [item] = await listCredentialsByIds(work.db, [id], work.today)
  return { stored, item: item! }
}

/** One credential with its file, what the law still wants in it, who judged it, and the person's others of the same type. */
export async function readCredential(work: Work, id: string): Promise<CredentialView> {
  const { stored, item } = await requireCredential(work, id)
  const isClose = can(work.actor, 'credentials.readAll') || stored.personId === work.actor.personId
  const names = await namesOf(work.db, [stored.verifiedBy, stored.withdrawnBy, stored.createdBy])
  const nameOf = (personId: string | null) => (personId && names.get(personId)) ?? null
  const file = stored.fileId ? await findFile(work.db, stored.fileId) : undefined
  const { items } = await listCredentials(work.db, { scope: { all: true }, today: work.today, personId: stored.personId, type: item.type, sort: '-issuedOn' }, { language: work.actor.language, limit: 50, offset: 0 })
  return {
    ...item,
    ownExpiresOn: stored.expiresOn,
    file: file ? { id: file.id, type: file.type, size: file.size } : null,
    missingDetails: missingLegalDetails(item.type, { ...stored.details, issuer: stored.issuer, expiresOn: stored.expiresOn }),
    verifiedBy: nameOf(stored.verifiedBy), verifiedAt: stored.verifiedAt, verificationNote: isClose ? stored.verificationNote : null,
    withdrawnOn: stored.withdrawnOn, withdrawnBy: nameOf(stored.withdrawnBy), withdrawalReason: isClose ? stored.withdrawalReason : null,
    addedBy: nameOf(stored.createdBy), addedAt: stored.createdAt,
    cardCode: isClose && isCounting(item.state) ? stored.cardCode : null,
    others: items.filter(other => other.id !== id).map(({ id, issuedOn, expiresOn, state }) => ({ id, issuedOn, expiresOn, state })),
  }
}

const printedProblems: Record<PrintedDateProblem, [string, string]> = {
  needed: ['expiresOnNeeded', 'the date printed on the card is needed'],
  refused: ['expiresOnRefused', 'is computed from the type; leave it out'],
  notADate: ['invalid', 'must be a date like 2026-12-01'],
  beforeIssue: ['expiresBeforeIssue', 'is before the date of issue'],
}

/** What stands in the way of adding this card, thrown as 422 with the field. */
export async function requireFitting(db: Db, input: NewCredential, actor: { personId: string, readsAll: boolean }): Promise<StoredType> {
  const type = await findCredentialType(db, input.type)
  if (!type) throw badField('type', 'is not a credential type', 'unknownType')
  if (type.module) throw badField('type', 'is only issued by passing its module', 'moduleOnly')
  const problem = printedDateProblem(type.validity, input.issuedOn, input.expiresOn)
  if (problem) throw badField('expiresOn', printedProblems[problem][1], printedProblems[problem][0])
  if (type.perSite && !input.siteId) throw badField('siteId', 'this type counts at one site: name it', 'siteNeeded')
  if (input.siteId && !await zoneOfSite(db, input.siteId)) throw badField('siteId', 'is not a site', 'unknownSite')
  if (!input.fileId) return type
  if (type.code === 'respirator-medical') throw badField('fileId', 'the medical form is never kept here, only the fact', 'factOnly')
  const file = await findFile(db, input.fileId)
  if (!file || (file.ownerId !== actor.personId && !actor.readsAll)) throw badField('fileId', 'is not a file of yours', 'unknownFile')
  return type
}

async function requireHolder(work: Work, personId: string): Promise<void> {
  const holder = await findHolder(work.db, personId)
  if (personId === work.actor.personId) return
  if (can(work.actor, 'credentials.readAll')) {
    if (!holder) throw notFound('person')
    return
  }
  const { crewIds } = await work.reach()
  if (!holder || !isWithin(crewIds, holder.crewId)) throw notFound('person')
  throw new Refusal('forbidden', 'forbidden', { message: 'Only the person or the safety manager may add a card' })
}

/** Adds an outside card, one's own or anybody's by the safety manager. It counts for nothing until it is verified. */
export async function addCredential(work: Work, input: NewCredential): Promise<CredentialView> {
  await requireHolder(work, input.personId)
  const { actor } = work
  const type = await requireFitting(work.db, input, { personId: actor.personId, readsAll: can(actor, 'credentials.readAll') })
  const id = randomUUID()
  const credential = {
    id, personId: input.personId, typeId: type.id, issuedOn: input.issuedOn, expiresOn: expiryOf(type.validity, input.issuedOn, input.expiresOn),
    number: input.number ?? null, issuer: input.issuer ?? null, siteId: input.siteId ?? null, details: input.details ?? null, fileId: input.fileId ?? null,
    verification: 'unverified' as const, cardCode: randomCode(), createdBy: actor.personId, createdAt: work.now,
  }
  await work.db.transaction(async (trx) => {
    await insertCredential(trx, credential)
    const { cardCode: _secret, ...after } = credential
    await appendAudit(trx, { at: work.now, actorId: actor.personId, action: 'credential.added', subject: { kind: 'credential', id }, after: { ...after, type: type.code } })
  })
  return readCredential(work, id)
}

/** Accepts a card, or rejects it and keeps it. Only one that nobody judged yet (otherwise 409). */
export async function judgeCredential(work: Work, id: string, { accept, note }: { accept: boolean, note?: string | null }): Promise<CredentialView> {
  await requireCredential(work, id)
  await work.db.transaction(async (trx) => {
    const before = await findCredential(trx, id)
    if (!before) throw notFound('credential')
    if (before.withdrawnOn) throw new Refusal('conflict', 'withdrawn', { message: 'It was withdrawn' })
    if (before.verification !== 'unverified') throw new Refusal('conflict', 'alreadyJudged', { message: 'It was judged already; a new card must be added' })
    const verification = accept ? 'verified' as const : 'rejected' as const
    await updateCredential(trx, id, { verification, verifiedBy: work.actor.personId, verifiedAt: work.now, verificationNote: note ?? null })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: `credential.${verification}`, subject: { kind: 'credential', id }, before: { verification: before.verification }, after: { verification, note: note ?? null } })
  })
  return readCredential(work, id)
}

/** Takes a credential back from today on, for a reason. It is never given back: a new one is issued instead. */
export async function withdrawCredential(work: Work, id: string, { reason }: { reason: string }): Promise<CredentialView> {
  await requireCredential(work, id)
  await work.db.transaction(async (trx) => {
    const before = await findCredential(trx, id)
    if (!before) throw notFound('credential')
    if (before.withdrawnOn) throw new Refusal('conflict', 'alreadyWithdrawn', { message: 'It was withdrawn already' })
    if (before.verification === 'rejected') throw new Refusal('conflict', 'rejected', { message: 'It was rejected, so there is nothing to withdraw' })
    await updateCredential(trx, id, { withdrawnOn: work.today, withdrawnBy: work.actor.personId, withdrawalReason: reason })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'credential.withdrawn', subject: { kind: 'credential', id }, before: { withdrawnOn: null }, after: { withdrawnOn: work.today, reason } })
  })
  return readCredential(work, id)
}
