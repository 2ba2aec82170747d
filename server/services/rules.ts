import { randomUUID } from 'node:crypto'
import type { Rule } from '#shared/domain/rules'
import type { Page } from '#shared/schemas/common'
import type { PreviewQuery } from '#shared/schemas/crews-and-sites'
import type { NewRuleBody, PreviewView, RuleChanges, RuleView } from '#shared/schemas/requirements'
import { appendAudit } from '../data/audit'
import { listRules } from '../data/clearance-facts'
import { listTypes } from '../data/credential-types'
import type { Db } from '../data/database'
import { listDuties } from '../data/duties'
import { deleteRule, insertRule, updateRule, type RuleRow } from '../data/rules'
import { getSite } from '../data/sites'
import { toPage } from './paging'
import { saveOrPreview } from './preview'
import { badField, notFound } from './refusal'
import type { Work } from './work'

const toView = (rule: Rule): RuleView => ({ id: rule.id, appliesTo: rule.appliesTo, groups: rule.groups.map(group => [...group]) })

/** A page of the rules, in the order in which they were made. */
export async function readRules(work: Work, query: { page: number, perPage: number }): Promise<Page<RuleView>> {
  return toPage((await listRules(work.db)).map(toView), query)
}

/** One rule, otherwise 404. */
export async function requireRule(db: Db, id: string): Promise<RuleView> {
  const [rule] = await listRules(db, id)
  if (!rule) throw notFound('rule')
  return toView(rule)
}

/** Adds a rule; 422 when it names a duty, site or type that is not there. */
export async function addRule(work: Work, body: NewRuleBody, query: PreviewQuery): Promise<RuleView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    const row = await toRow(trx, { id: randomUUID(), ...body })
    await insertRule(trx, row, work.now)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'rule.added', subject: { kind: 'rule', id: row.id }, after: body })
    return requireRule(trx, row.id)
  })
}

/** Changes what a rule applies to or asks for. */
export async function changeRule(work: Work, id: string, body: RuleChanges, query: PreviewQuery): Promise<RuleView | PreviewView> {
  return saveOrPreview(work, query, async (trx) => {
    const before = await requireRule(trx, id)
    await updateRule(trx, await toRow(trx, { ...before, ...body }))
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'rule.changed', subject: { kind: 'rule', id }, before, after: body })
    return requireRule(trx, id)
  })
}

/** Takes a rule away; the trail keeps what it asked for. */
export async function removeRule(work: Work, id: string): Promise<void> {
  await work.db.transaction(async (trx) => {
    const before = await requireRule(trx, id)
    await deleteRule(trx, id)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'rule.removed', subject: { kind: 'rule', id }, before })
  })
}

async function toRow(db: Db, rule: RuleView): Promise<RuleRow> {
  const { duty, site } = rule.appliesTo
  const dutyId = duty === undefined ? null : (await listDuties(db)).find(one => one.code === duty)?.id
  if (dutyId === undefined) throw badField('appliesTo.duty', 'no such duty', 'unknownDuty')
  if (site !== undefined && !await getSite(db, site)) throw badField('appliesTo.site', 'no such site', 'unknownSite')
  const typeIds = new Map((await listTypes(db)).map(type => [type.code, type.id]))
  const groups = rule.groups.map((group, index) => group.map((code, place) => {
    const typeId = typeIds.get(code)
    if (!typeId) throw badField(`groups.${index}.${place}`, `no such credential type: ${code}`, 'unknownType')
    return typeId
  }))
  return { id: rule.id, dutyId, siteId: site ?? null, groups }
}
