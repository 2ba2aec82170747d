import { describe, expect, it } from 'vitest'
import { alphaOf, correlation, reviewItems, type ReviewedAttempt } from '#shared/domain/item-review'

/** One attempt per row, items a, b, c … in columns. */
const matrix = (...rows: number[][]): ReviewedAttempt[] => rows.map((row, index) => ({
  personId: `p${index}`, items: row.map((share, column) => ({ id: 'abcdefgh'.charAt(column), share, wrongPicks: share === 1 ? [] : ['x'] })),
}))
const times = (count: number, row: number[]) => Array.from({ length: count }, () => row)

describe('the review of items', () => {
  it('computes alpha as the textbook does where everybody was served the same', () => {
    const rows = [[1, 1, 1], [1, 1, 0], [0, 0, 1], [0, 0, 0]]
    expect(alphaOf(matrix(...rows))).toBeCloseTo(alphaByHand(rows), 12)
    expect(alphaOf(matrix([1, 1, 1], [1, 1, 0], [1, 0, 0], [0, 0, 0]))).toBeCloseTo(0.75, 12)
  })

  it('correlates an item with the rest without itself', () => {
    expect(correlation([1, 1, 0, 0], [1, 0.5, 0.5, 0])).toBeCloseTo(0.7071067811865475, 12)
    const { items } = reviewItems(['a'], matrix([1, 1, 1], [1, 1, 0], [0, 1, 0], [0, 0, 0]))
    expect(items[0]?.itemRest).toBeCloseTo(0.7071067811865475, 12)
  })

  it('tells nothing where nothing varies or nobody came', () => {
    expect(correlation([1, 1], [0, 1])).toBeNull()
    expect(reviewItems(['a'], [])).toEqual({ people: 0, alpha: null, items: [{ id: 'a', served: 0, p: 0, itemRest: null, picks: {}, flags: [] }] })
  })

  it('flags nothing below 30 servings', () => {
    expect(reviewItems(['a'], matrix(...times(29, [0, 1]))).items[0]?.flags).toEqual([])
    expect(reviewItems(['a'], matrix(...times(30, [0, 1]))).items[0]?.flags).toEqual(['tooHard'])
    expect(reviewItems(['a'], matrix(...times(30, [1, 1]))).items[0]?.flags).toEqual(['tooEasy'])
  })

  it('holds items against the rest without the struck ones, and still reports those', () => {
    const rows = [[1, 1, 1, 0], [1, 1, 0, 1], [1, 0, 0, 0], [0, 0, 0, 1]]
    const figures = reviewItems(['a', 'd'], matrix(...rows), new Set(['d']))
    const without = reviewItems(['a'], matrix(...rows.map(row => row.slice(0, 3))))
    expect(figures.alpha).toBeCloseTo(without.alpha!, 12)
    expect(figures.items[0]!.itemRest).toBeCloseTo(without.items[0]!.itemRest!, 12)
    expect(figures.items[1]).toMatchObject({ id: 'd', served: 4, p: 0.5 })
  })

  it('suspects the key where those who know the rest get the item wrong', () => {
    const { items } = reviewItems(['a'], matrix(...times(15, [0, 1, 1]), ...times(15, [1, 0, 0])))
    expect(items[0]).toMatchObject({ served: 30, p: 0.5, itemRest: -1, picks: { x: 15 }, flags: ['keyMayBeWrong'] })
  })
})

/** The textbook formula: k/(k−1) · (1 − sum of item variances / variance of totals). */
function alphaByHand(rows: number[][]): number {
  const variance = (values: number[]) => {
    const middle = values.reduce((sum, value) => sum + value, 0) / values.length
    return values.reduce((sum, value) => sum + (value - middle) ** 2, 0) / (values.length - 1)
  }
  const length = rows[0]!.length
  const itemVariance = rows[0]!.map((_, column) => variance(rows.map(row => row[column]!))).reduce((sum, value) => sum + value, 0)
  return length / (length - 1) * (1 - itemVariance / variance(rows.map(row => row.reduce((sum, value) => sum + value, 0))))
}
