import { randomUUID } from 'node:crypto'
import { moduleBySlug } from '#shared/domain/curriculum'
import { validityProblem } from '#shared/domain/validity'
import type { Validity } from '#shared/domain/validity'
import type { Page } from '#shared/schemas/common'
import type { NamedListQuery, PreviewQuery } from '#shared/schemas/crews-and-sites'
import type { NewTypeBody, PreviewView, TypeChanges, TypeView } from '#shared/schemas/requirements'
import { appendAudit } from '../data/audit'
import { insertType, listTypes, updateType } from '../data/credential-types'
import type { Db } from '../data/database'
import { matching, toPage } from './paging'
import { saveOrPreview } from './preview'
import { badField, notFound, Refusal } from './refusal'
import type { Work } from './work'

/** A page of the credential types, by code. */
export async function readTypes(work: Work, query: NamedListQuery): Promise<Page<TypeView>> {
  return toPage(matching(await listTypes(work.db), query.q, type => [type.code, type.name.en, type.name.es]), query)
}

/** One type by its id or its code, otherwise 404. */
export async function requireType(db: Db, idOrCode: string): Promise<TypeView> {
  const type = (await listTypes(db)).find(one => one.id === idOrCode || one.code === idOrCode)
  if (!type) throw notFound('credential type')
  return type
}

/** Adds a type; 409 when its code or its module is taken, 422 when its interval breaks a rule. */
export async function addType(work: Work, body: NewTypeBody, query: PreviewQuery): Promise<TypeView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    const all = await listTypes(trx)
    if (all.some(type => type.code === body.code)) throw new Refusal('conflict', 'codeTaken', { message: 'Another type has this code', fields: { code: 'is another type\'s' } })
    if (body.module && !moduleBySlug(body.module)) throw badField('module', 'no such module', 'unknownModule')
    if (body.module && all.some(type => type.module === body.module)) throw new Refusal('conflict', 'moduleTaken', { message: 'This module issues another type', fields: { module: 'issues another type' } })
    checkValidity(body)
    const type: TypeView = { ...body, id: randomUUID(), module: body.module ?? null }
    await insertType(trx, type, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'credentialType.added', subject: { kind: 'credentialType', id: type.id }, after: type })
    return type
  })
}

/** Changes a type. Its code and module stay; credentials that were issued before keep their dates. */
export async function changeType(work: Work, id: string, body: TypeChanges, query: PreviewQuery): Promise<TypeView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    const before = await requireType(trx, id)
    checkValidity({ validity: before.validity as Validity, basis: before.basis, ...body })
    await updateType(trx, before.id, body)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'credentialType.changed', subject: { kind: 'credentialType', id: before.id }, before, after: body })
    return requireType(trx, before.id)
  })
}

function checkValidity(type: { validity: Validity, basis: TypeView['basis'] }): void {
  const problem = validityProblem(type)
  if (problem === 'monthEndOverrunsLaw') throw badField('validity.anchor', 'an interval of the law may not run to the month\'s end', problem)
  if (problem) throw badField('validity.months', 'must be 1 to 600', problem)
}
