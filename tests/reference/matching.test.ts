import { describe, expect, it } from 'vitest'
import { cheapestMatching, costOf } from '#shared/domain/matching'

describe('assignment problems from the tests of SciPy’s linear_sum_assignment', () => {
  it.each<[number[][], number]>([
    [[[400, 150, 400], [400, 450, 600], [300, 225, 300]], 850],
    [[[10, 10, 8], [9, 8, 1], [9, 7, 4]], 18],
    [[[10, 10, 8, 11], [9, 8, 1, 1], [9, 7, 4, 10]], 15],
  ])('%j costs %i', (costs, expected) => {
    expect(costOf(costs, cheapestMatching(costs))).toBe(expected)
  })
})
