import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { cheapestMatching, costOf, largestMatching, type Matching, shortRows } from '#shared/domain/matching'

type Costs = (number | null)[][]

/** Every matching there is, by trying them all. */
function everyMatching(costs: Costs): Matching[] {
  let found: Matching[] = [[]]
  for (const line of costs) {
    found = found.flatMap(matching => [
      [...matching, null],
      ...line.flatMap((cost, column) => cost === null || matching.includes(column) ? [] : [[...matching, column]]),
    ])
  }
  return found
}

const filled = (matching: Matching) => matching.filter(column => column !== null).length
const choicesOf = (costs: Costs) => costs.map(line => line.flatMap((cost, column) => cost === null ? [] : [column]))
const anyCosts = fc.integer({ min: 0, max: 5 }).chain(columns =>
  fc.array(fc.array(fc.option(fc.integer({ min: 0, max: 9 }), { freq: 2 }), { minLength: columns, maxLength: columns }), { maxLength: 5 }))

function isSound(costs: Costs, matching: Matching): boolean {
  const taken = matching.filter(column => column !== null)
  return matching.length === costs.length && new Set(taken).size === taken.length
    && matching.every((column, row) => column === null || typeof costs[row]?.[column] === 'number')
}

describe('a largest matching', () => {
  it('fills as many rows as trying everything does', () => {
    fc.assert(fc.property(anyCosts, (costs) => {
      const matching = largestMatching(choicesOf(costs))
      expect(isSound(costs, matching)).toBe(true)
      expect(filled(matching)).toBe(Math.max(...everyMatching(costs).map(filled)))
    }), { numRuns: 500 })
  })

  it('moves somebody over where a greedy choice would leave a row empty', () => {
    expect(largestMatching([[0, 1], [0]])).toEqual([1, 0])
  })

  it('of nothing is nothing', () => {
    expect(largestMatching([])).toEqual([])
    expect(largestMatching([[], []])).toEqual([null, null])
  })
})

describe('why rows stay empty', () => {
  it('is told by rows that share fewer columns than they are', () => {
    expect(shortRows([[0], [0, 1], [0], [2]], [0, 1, null, 2])).toEqual({ rows: [0, 2], columns: [0] })
  })

  it('is told exactly when a row is empty, and is true', () => {
    fc.assert(fc.property(anyCosts, (costs) => {
      const choices = choicesOf(costs)
      const matching = largestMatching(choices)
      const reason = shortRows(choices, matching)
      expect(reason === null).toBe(!matching.includes(null))
      if (reason === null) return
      expect(reason.columns).toEqual([...new Set(reason.rows.flatMap(row => choices[row] ?? []))].sort())
      expect(reason.columns.length).toBeLessThan(reason.rows.length)
    }), { numRuns: 500 })
  })
})

describe('a cheapest matching', () => {
  it('fills the most rows and costs the least of all that do', () => {
    fc.assert(fc.property(anyCosts, (costs) => {
      const matching = cheapestMatching(costs)
      const all = everyMatching(costs)
      const most = Math.max(...all.map(filled))
      const least = Math.min(...all.filter(one => filled(one) === most).map(one => costOf(costs, one)))
      expect(isSound(costs, matching)).toBe(true)
      expect([filled(matching), costOf(costs, matching)]).toEqual([most, least])
    }), { numRuns: 500 })
  })
})
