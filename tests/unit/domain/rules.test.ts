import { describe, expect, it } from 'vitest'
import { prepareRules, type Rule, ruleProblem } from '#shared/domain/rules'

const rules: Rule[] = [
  { id: '1', appliesTo: { everybody: true }, groups: [['hazard-communication']] },
  { id: '2', appliesTo: { duty: 'stacker' }, groups: [['stacking'], ['ladders', 'scaffold-user']] },
  { id: '3', appliesTo: { site: 'north' }, groups: [['site-orientation'], ['scaffold-user', 'ladders']] },
  { id: '4', appliesTo: { duty: 'stacker', site: 'north' }, groups: [['silica']] },
]

function asked(duty: string, site: string | null): string[] {
  return prepareRules(rules).groupsFor(duty, site).map(group => group.anyOf.join('|')).sort()
}

describe('the groups for a duty at a site', () => {
  it('are those of everybody, the duty, the site, and the duty at the site', () => {
    expect(asked('stacker', 'north')).toEqual(['hazard-communication', 'ladders|scaffold-user', 'silica', 'site-orientation', 'stacking'])
  })

  it('leave out other duties and other sites', () => {
    expect(asked('stacker', 'south')).toEqual(['hazard-communication', 'ladders|scaffold-user', 'stacking'])
    expect(asked('hose-hand', 'north')).toEqual(['hazard-communication', 'scaffold-user|ladders', 'site-orientation'])
    expect(asked('hose-hand', null)).toEqual(['hazard-communication'])
  })

  it('hold the same group once, and as the duty’s own when the duty asks for it', () => {
    const groups = prepareRules(rules).groupsFor('stacker', 'north').filter(group => group.anyOf.includes('ladders'))
    expect(groups).toEqual([{ anyOf: ['ladders', 'scaffold-user'], isOfDuty: true }])
  })

  it('do not change when the list changes afterwards', () => {
    const list = [...rules]
    const prepared = prepareRules(list)
    list.length = 0
    expect(prepared.groupsFor('stacker', 'south')).toHaveLength(3)
  })

  it('do not repeat a type inside a group', () => {
    const doubled = prepareRules([{ id: '1', appliesTo: { everybody: true }, groups: [['silica', 'silica']] }])
    expect(doubled.groupsFor('stacker', null)).toEqual([{ anyOf: ['silica'], isOfDuty: false }])
  })
})

describe('a rule', () => {
  it('without groups, or with a group that nothing can meet, is refused', () => {
    expect(ruleProblem({ groups: [] })).toBe('noGroups')
    expect(ruleProblem({ groups: [['silica'], []] })).toBe('emptyGroup')
    expect(ruleProblem({ groups: [['silica']] })).toBeNull()
  })
})
