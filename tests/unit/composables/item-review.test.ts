import { describe, expect, it } from 'vitest'
import type { ItemReviewLine } from '../../../shared/schemas/item-review'
import { headlineOf, sortLines, toFigure, toPercent, toTakenIn } from '../../../composables/useItemReview'

const line = (id: string, changes: Partial<ItemReviewLine> = {}): ItemReviewLine => ({
  id, served: 40, p: 0.8, low: 0.65, high: 0.9, itemRest: 0.3, picks: {}, flags: [], kind: 'one', mustKnow: false,
  lesson: { slug: 'first', title: 'First' }, stem: id, options: [], struck: null, ...changes,
})
const struck = { reason: 'unclear', by: 'Sara', at: '2026-12-01T13:30:00Z' }

describe('the headline', () => {
  it.each([
    ['headlineNobody', [line('a')], 0],
    ['headlineTooFew', [line('a', { served: 29 })], 29],
    ['headlineNone', [line('a'), line('b', { served: 3 })], 40],
    ['headline', [line('a', { flags: ['tooHard'] }), line('b')], 40],
    ['headlineNone', [line('a', { flags: ['tooHard'], struck }), line('b')], 40],
    ['headlineStruckAll', [line('a', { struck })], 40],
  ] as const)('is %s', (key, items, attempts) => expect(headlineOf({ items: [...items], attempts }).key).toBe(key))

  it('counts those to look at among those still asked', () => {
    expect(headlineOf({ attempts: 40, items: [line('a', { flags: ['tooHard', 'doesNotSeparate'] }), line('b'), line('c', { struck })] })).toEqual({ key: 'headline', n: 1, total: 2 })
  })
})

describe('the order of the table', () => {
  const lines = [line('c', { flags: ['tooHard'] }), line('b', { struck }), line('a', { p: 0.9 }), line('d', { served: 0, p: 0, itemRest: null })]
  const order = (sort: string) => sortLines(lines, sort).map(one => one.id).join('')

  it('puts those to look at on top and those taken out last, the same ones by their number', () => expect(order('-flags')).toBe('cadb'))
  it('puts what was never asked after the hardest', () => expect(order('p')).toBe('bcad'))
  it('knows no other column', () => expect(order('-nothing')).toBe(order('-flags')))
})

describe('figures in words', () => {
  it('round to whole percent, never to all or none that is not so', () => {
    expect([0, 0.001, 0.494, 0.5, 0.999, 1].map(toPercent)).toEqual([0, 1, 49, 50, 99, 100])
  })
  it('have a real minus, and no minus before nothing', () => expect([-0.123, -0.001, 0.5].map(toFigure)).toEqual(['−0.12', '0.00', '0.50']))
  it('take any other word in the address for both languages', () => expect(['es', 'fr', undefined].map(toTakenIn)).toEqual(['es', 'all', 'all']))
})
