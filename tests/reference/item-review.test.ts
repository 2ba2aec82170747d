import fc from 'fast-check'
import { sampleCorrelation, sum, variance } from 'simple-statistics'
import { describe, expect, it } from 'vitest'
import { reviewItems, type ReviewedAttempt } from '#shared/domain/item-review'
import { wilsonInterval } from '#shared/domain/review-figures'

const toAttempts = (rows: readonly (readonly number[])[]): ReviewedAttempt[] => rows.map((row, index) => ({
  personId: `p${index}`, items: row.map((share, column) => ({ id: `i${column}`, share, wrongPicks: [] })),
}))
const idsOf = (rows: readonly (readonly number[])[]) => (rows[0] ?? []).map((_share, column) => `i${column}`)
const review = (rows: readonly (readonly number[])[]) => reviewItems(idsOf(rows), toAttempts(rows))

describe('the published example of 10 learners and 10 items (course notes of East Carolina University)', () => {
  const rows = ['1111110110', '1011011101', '1111011001', '0010001000', '0000010010', '1110111111', '1101110111', '1111111101', '0101111101', '1101101110']
    .map(row => [...row].map(Number))
  const totals = rows.map(sum)
  const shares = rows[0]!.map((_first, column) => sum(rows.map(row => row[column]!)) / rows.length)

  it('has the published totals, variance and sum of pq', () => {
    expect(totals).toEqual([8, 7, 7, 2, 2, 9, 8, 9, 7, 7])
    expect(variance(totals)).toBeCloseTo(5.84, 12)
    expect(sum(shares.map(share => share * (1 - share)))).toBeCloseTo(2.18, 12)
  })

  it('gives KR-20 = 0.696347', () => expect(review(rows).alpha!.toFixed(6)).toBe('0.696347'))

  it('gives the share right of each item', () => {
    for (const [column, item] of review(rows).items.entries()) expect(item.p).toBeCloseTo(shares[column]!, 12)
  })

  it('gives the corrected point-biserials to their last digit', () => {
    const given = review(rows).items.map(item => item.itemRest!.toFixed(4).replace('-0.0000', '0.0000'))
    expect(given).toEqual(['0.7059', '0.7059', '0.0000', '0.4736', '0.5839', '0.2861', '-0.0274', '0.7059', '-0.1236', '0.4759'])
  })
})

describe('figures against simple-statistics 7.12, on random answers', () => {
  const share = fc.oneof(fc.constantFrom(0, 1), fc.integer({ min: 0, max: 4 }).map(part => part / 4))
  const tables = fc.integer({ min: 2, max: 12 }).chain(columns => fc.array(fc.array(share, { minLength: columns, maxLength: columns }), { minLength: 3, maxLength: 60 }))
  const isFlat = (values: number[]) => variance(values) < 1e-12

  it('agree on the item-rest correlation of every item', () => {
    fc.assert(fc.property(tables, (rows) => {
      for (const [column, { itemRest }] of review(rows).items.entries()) {
        const own = rows.map(row => row[column]!)
        const rest = rows.map(row => sum(row) - row[column]!)
        if (isFlat(own) || isFlat(rest)) expect(itemRest).toBeNull()
        else expect(itemRest).toBeCloseTo(sampleCorrelation(own, rest), 9)
      }
    }), { numRuns: 200 })
  })

  it('agree on alpha, by the textbook formula over its variances', () => {
    fc.assert(fc.property(tables, (rows) => {
      const totals = rows.map(sum)
      if (isFlat(totals)) return expect(review(rows).alpha).toBeNull()
      const columns = rows[0]!.map((_first, column) => rows.map(row => row[column]!))
      const alpha = columns.length / (columns.length - 1) * (1 - sum(columns.map(variance)) / variance(totals))
      expect(review(rows).alpha).toBeCloseTo(alpha, 7)
    }), { numRuns: 200 })
  })
})

describe('Wilson\'s 95 % interval of a share', () => {
  it.each([[13, 16, 0.5699, 0.9341], [8, 10, 0.4902, 0.9433], [0, 10, 0, 0.2775], [84, 85, 0.9363, 0.9979]])('of %i of %i is the published one', (right, served, low, high) => {
    const range = wilsonInterval(right / served, served)!
    expect([range.low.toFixed(4), range.high.toFixed(4)]).toEqual([low.toFixed(4), high.toFixed(4)])
  })
})
