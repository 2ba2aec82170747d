import { type DemoContext, instantAt } from './context'
import { personId } from './people'
import { demoId } from './random'
import { personByKey } from './roster'
import { demoSites, mondayOfWeek, siteId } from './sites-and-crews'

async function insertRule(context: DemoContext, rule: { id: string, siteId: string | null, code: string, createdAt: string }): Promise<void> {
  const type = await context.knex('credentialTypes').where({ code: rule.code }).first('id')
  await context.knex('rules').insert({ id: rule.id, siteId: rule.siteId, createdAt: rule.createdAt })
  await context.knex('ruleTypes').insert({ ruleId: rule.id, groupNumber: 0, typeId: type.id })
  const appliesTo = rule.siteId ? { site: rule.siteId } : { everybody: true }
  context.audit.push({ at: rule.createdAt, actorId: personId(personByKey('solheim')), action: 'rule.created', subject: { kind: 'rule', id: rule.id }, after: { appliesTo, groups: [[rule.code]] } })
}

/** Everybody holds hazard communication; each site asks for its own orientation. The duties' rules are reference data. */
export async function seedRules(context: DemoContext): Promise<void> {
  await insertRule(context, { id: demoId('rule everybody'), siteId: null, code: 'hazard-communication', createdAt: instantAt(mondayOfWeek(context, -104), 9, 0) })
  for (const site of demoSites) {
    const createdAt = instantAt(mondayOfWeek(context, site.opensInWeek), 9, 40)
    await insertRule(context, { id: demoId(`rule ${site.key}`), siteId: siteId(site.key), code: 'site-orientation', createdAt })
  }
}
