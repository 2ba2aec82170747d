import { describe, expect, it } from 'vitest'
import { seasonOf, suggestTalks, type TalkTags } from '#shared/domain/suggestions'

const talk = (slug: string, rest: Partial<TalkTags> = {}): TalkTags => ({ slug, work: [], hazards: [], seasons: [], ...rest })
const day = { date: '2026-12-01', work: [], hazards: [] } as const
const given = (here: Record<string, string> = {}, company = here) => ({ here: new Map(Object.entries(here)), company: new Map(Object.entries(company)) })
const first = (talks: TalkTags[], options: Partial<Parameters<typeof suggestTalks>[0]>) => suggestTalks({ talks, day, history: given(), ...options })

describe('suggestTalks', () => {
  it('puts the day\'s work before the weather, and the weather before what was never heard', () => {
    const talks = [talk('a'), talk('b', { hazards: ['cold'] }), talk('c', { work: ['pour'] })]
    expect(first(talks, { day: { date: '2026-12-01', work: ['pour'], hazards: ['cold'] } }).map(row => row.slug)).toEqual(['c', 'b', 'a'])
  })

  it('names the tags that match and no others', () => {
    const [row] = first([talk('a', { work: ['stack', 'pour'], hazards: ['cold', 'wind'] })], { day: { date: '2026-12-01', work: ['pour', 'cut'], hazards: ['wind'] } })
    expect(row!.reasons).toEqual([{ kind: 'work', tags: ['pour'] }, { kind: 'weather', tags: ['wind'] }, { kind: 'neverHere' }])
  })

  it.each([
    ['2026-12-01', { kind: 'justGiven', days: 0 }], ['2026-11-25', { kind: 'justGiven', days: 6 }], ['2026-11-24', undefined], ['2026-11-18', undefined], ['2026-11-17', { kind: 'notLately', days: 14 }],
  ])('last given here on %s gives %j', (last, reason) => {
    expect(first([talk('a')], { history: given({ a: last }) })[0]!.reasons[0]).toEqual(reason)
  })

  it('steps back a talk of the last week even when it fits the work', () => {
    const talks = [talk('a', { work: ['pour'] }), talk('b')]
    expect(first(talks, { day: { date: '2026-12-01', work: ['pour'], hazards: [] }, history: given({ a: '2026-11-30' }) }).map(row => row.slug)).toEqual(['b', 'a'])
  })

  it('lets a near miss here of the last 30 days lead, the 31st day no more', () => {
    const talks = [talk('a', { hazards: ['height'] }), talk('b', { work: ['pour'] })]
    const on = (date: string) => first(talks, { day: { date: '2026-12-01', work: ['pour'], hazards: [] }, nearMisses: [{ hazards: ['height'], date, isHere: true }] }).map(row => row.slug)
    expect(on('2026-11-01')).toEqual(['a', 'b'])
    expect(on('2026-10-31')).toEqual(['b', 'a'])
  })

  it('calls a talk overdue by rotation after 60 days anywhere in the company, and not on the 60th', () => {
    const kinds = (last: string) => first([talk('a')], { history: given({}, { a: last }) })[0]!.reasons.map(reason => reason.kind)
    expect(kinds('2026-10-01')).toContain('rotation')
    expect(kinds('2026-10-02')).not.toContain('rotation')
  })

  it('orders equal scores by slug, whatever order they came in', () => {
    expect(first([talk('b'), talk('a'), talk('c')], {}).map(row => row.slug)).toEqual(['a', 'b', 'c'])
  })
})

it.each([['2026-02-28', 'winter'], ['2026-03-01', 'spring'], ['2026-06-01', 'summer'], ['2026-09-01', 'autumn'], ['2026-12-01', 'winter']])('%s lies in %s', (date, season) => {
  expect(seasonOf(date)).toBe(season)
})
