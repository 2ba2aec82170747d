/** What a rule belongs to: everybody, a duty (by code), a site (by id), or a duty at a site. */
export type RuleScope
  = | { everybody: true }
    | { duty: string, site?: undefined }
    | { site: string, duty?: undefined }
    | { duty: string, site: string }

/** What somebody asks for: every group must be met, and any one credential type inside a group meets it. */
export interface Rule {
  id: string
  appliesTo: RuleScope
  /** Groups of credential type codes. */
  groups: readonly (readonly string[])[]
}

/** One group as it applies to a duty at a site. */
export interface RuleGroup {
  /** Credential type codes, any one of which meets the group, without repeats and in the order of the rule. */
  anyOf: readonly string[]
  /** True when the group comes from a rule of the duty itself, where the duty's recent practice counts. */
  isOfDuty: boolean
}

/** Rules made ready for many questions; answers for the same duty and site are worked out once. */
export interface PreparedRules {
  /** Every group of everybody, the site, the duty, and the duty at the site; the same group only once. */
  groupsFor(duty: string, siteId: string | null): readonly RuleGroup[]
}

/** What is wrong with a rule's groups, or null: a rule without groups, or a group that nothing can meet. */
export function ruleProblem(rule: Pick<Rule, 'groups'>): 'noGroups' | 'emptyGroup' | null {
  if (rule.groups.length === 0) return 'noGroups'
  return rule.groups.some(group => group.length === 0) ? 'emptyGroup' : null
}

/** Indexes the rules of a company once. The list is copied, so that a later change to it changes nothing here. */
export function prepareRules(rules: readonly Rule[]): PreparedRules {
  const kept = rules.map(rule => ({ scope: rule.appliesTo, groups: rule.groups.map(group => [...new Set(group)]) }))
  const answersBySite = new Map<string | null, Map<string, readonly RuleGroup[]>>()

  function groupsFor(duty: string, siteId: string | null): readonly RuleGroup[] {
    const answers = answersBySite.get(siteId) ?? new Map<string, readonly RuleGroup[]>()
    answersBySite.set(siteId, answers)
    const groups = answers.get(duty) ?? collectGroups(kept, duty, siteId)
    answers.set(duty, groups)
    return groups
  }

  return { groupsFor }
}

function collectGroups(
  rules: readonly { scope: RuleScope, groups: readonly (readonly string[])[] }[], duty: string, siteId: string | null,
): RuleGroup[] {
  const found = new Map<string, RuleGroup>()
  for (const { scope, groups } of rules) {
    if (!appliesTo(scope, duty, siteId)) continue
    const isOfDuty = 'duty' in scope && scope.duty !== undefined
    for (const anyOf of groups) {
      const key = JSON.stringify([...anyOf].sort())
      const earlier = found.get(key)
      found.set(key, { anyOf: earlier?.anyOf ?? anyOf, isOfDuty: isOfDuty || earlier?.isOfDuty === true })
    }
  }
  return [...found.values()]
}

function appliesTo(scope: RuleScope, duty: string, siteId: string | null): boolean {
  if ('everybody' in scope) return true
  if (scope.duty !== undefined && scope.duty !== duty) return false
  return scope.site === undefined || scope.site === siteId
}
