import type { Db } from './database'

/** A rule as it is written: ids, not codes. */
export interface RuleRow {
  id: string
  dutyId: string | null
  siteId: string | null
  /** Groups of type ids. */
  groups: string[][]
}

/** Adds a rule with its groups. */
export async function insertRule(db: Db, rule: RuleRow, now: string): Promise<void> {
  await db('rules').insert({ id: rule.id, dutyId: rule.dutyId, siteId: rule.siteId, createdAt: now })
  await insertGroups(db, rule)
}

/** Writes what a rule applies to and its groups anew. */
export async function updateRule(db: Db, rule: RuleRow): Promise<void> {
  await db('rules').where({ id: rule.id }).update({ dutyId: rule.dutyId, siteId: rule.siteId })
  await db('ruleTypes').where({ ruleId: rule.id }).delete()
  await insertGroups(db, rule)
}

/** Takes a rule away. */
export async function deleteRule(db: Db, id: string): Promise<void> {
  await db('rules').where({ id }).delete()
}

async function insertGroups(db: Db, rule: RuleRow): Promise<void> {
  await db('ruleTypes').insert(rule.groups.flatMap((group, groupNumber) => [...new Set(group)].map(typeId => ({ ruleId: rule.id, groupNumber, typeId }))))
}
