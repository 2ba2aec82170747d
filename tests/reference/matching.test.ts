import highsLoader from 'highs'
import munkres from 'munkres'
import { beforeAll, describe, expect, it } from 'vitest'
import { crewingOf, type CrewingPair, type CrewingQuestion } from '#shared/domain/crewing'
import { cheapestMatching, costOf, largestMatching, shortRows } from '#shared/domain/matching'
import { randomFrom } from '../support/random'

type Costs = (number | null)[][]
/** Dearer than any whole matching of the instances below, so that an assignment uses it only where nothing else is left. */
const forbidden = 1_000_000

let solve: (model: string) => Record<string, number>
beforeAll(async () => {
  const highs = await highsLoader()
  solve = (model) => {
    const answer = highs.solve(model)
    expect(answer.Status).toBe('Optimal')
    return Object.fromEntries(Object.entries(answer.Columns).map(([name, column]) => [name, Math.round('Primal' in column ? column.Primal ?? 0 : 0)]))
  }
})

describe('assignment problems from the tests of SciPy’s linear_sum_assignment', () => {
  it.each<[number[][], number]>([
    [[[400, 150, 400], [400, 450, 600], [300, 225, 300]], 850],
    [[[10, 10, 8], [9, 8, 1], [9, 7, 4]], 18],
    [[[10, 10, 8, 11], [9, 8, 1, 1], [9, 7, 4, 10]], 15],
  ])('%j costs %i', (costs, expected) => {
    expect(costOf(costs, cheapestMatching(costs))).toBe(expected)
    expect(munkres(costs).reduce((sum, [row, column]) => sum + costs[row]![column]!, 0)).toBe(expected)
  })
})

/** Rows filled and their cost, by munkres 2.0.4 on a square table where what is forbidden is dear. */
function byMunkres(costs: Costs): [number, number] {
  const size = Math.max(costs.length, costs[0]?.length ?? 0)
  if (size === 0) return [0, 0]
  const square = Array.from({ length: size }, (_, row) => Array.from({ length: size }, (_, column) => costs[row]?.[column] ?? forbidden))
  const used = munkres(square).flatMap(([row, column]) => costs[row]?.[column] ?? [])
  return [used.length, used.reduce((sum, cost) => sum + cost, 0)]
}

/** The same as an integer program by HiGHS 1.15.3: fill the most rows first, then pay the least. */
function byHighs(costs: Costs): [number, number] {
  const cells = costs.flatMap((line, row) => line.flatMap((cost, column) => (cost === null ? [] : [{ row, column, cost, name: `x${row}y${column}` }])))
  if (cells.length === 0) return [0, 0]
  const once = (key: 'row' | 'column') => [...new Set(cells.map(cell => cell[key]))].map(index => `${key}${index}: ${cells.filter(cell => cell[key] === index).map(cell => cell.name).join(' + ')} <= 1`)
  const picked = solve([
    'Minimize', `cost: ${cells.map(cell => `${cell.cost - forbidden} ${cell.name}`).join(' + ').replaceAll('+ -', '- ')}`,
    'Subject To', ...once('row'), ...once('column'), 'Binary', cells.map(cell => cell.name).join(' '), 'End',
  ].join('\n'))
  const used = cells.filter(cell => picked[cell.name] === 1)
  return [used.length, used.reduce((sum, cell) => sum + cell.cost, 0)]
}

/** Rows filled and their cost, by trying everything. */
function byTrying(costs: Costs, row = 0, taken = 0): [number, number] {
  if (row === costs.length) return [0, 0]
  let best = byTrying(costs, row + 1, taken)
  for (const [column, cost] of costs[row]!.entries()) {
    if (cost === null || taken & 1 << column) continue
    const [filled, paid] = byTrying(costs, row + 1, taken | 1 << column)
    if (filled + 1 > best[0] || (filled + 1 === best[0] && paid + cost < best[1])) best = [filled + 1, paid + cost]
  }
  return best
}

function randomCosts(random: (below: number) => number, most: number): Costs {
  const columns = random(most) + 1
  const share = random(9) + 1
  return Array.from({ length: random(most) + 1 }, () => Array.from({ length: columns }, () => (random(10) < share ? random(300) : null)))
}

describe('matchings on random tables', () => {
  it('fill the same rows at the same cost as munkres and as trying everything, 3,000 times', () => {
    const random = randomFrom(11)
    for (let round = 0; round < 3000; round += 1) {
      const costs = randomCosts(random, 6)
      const matching = cheapestMatching(costs)
      const own = [matching.filter(column => column !== null).length, costOf(costs, matching)]
      expect(own).toEqual(byTrying(costs))
      expect(own).toEqual(byMunkres(costs))
    }
  })

  it('fill the same rows at the same cost as munkres and as an integer program by HiGHS, 500 larger ones', () => {
    const random = randomFrom(12)
    for (let round = 0; round < 500; round += 1) {
      const costs = randomCosts(random, 14)
      const matching = cheapestMatching(costs)
      const own = [matching.filter(column => column !== null).length, costOf(costs, matching)]
      expect(own).toEqual(byMunkres(costs))
      expect(own).toEqual(byHighs(costs))
    }
  }, 120_000)

  it('that leave a row empty are explained by a set of rows with too few columns: Hall’s condition, P. Hall 1935', () => {
    const random = randomFrom(13)
    let explained = 0
    for (let round = 0; round < 3000; round += 1) {
      const choices = randomCosts(random, 9).map(line => line.flatMap((cost, column) => (cost === null ? [] : [column])))
      const matching = largestMatching(choices)
      const reason = shortRows(choices, matching)
      expect(reason === null).toBe(!matching.includes(null))
      if (!reason) continue
      explained += 1
      expect(new Set(reason.rows.flatMap(row => choices[row]!))).toEqual(new Set(reason.columns))
      expect(reason.columns.length).toBeLessThan(reason.rows.length)
    }
    expect(explained).toBeGreaterThan(500)
  })
})

/** A day with slots, people, placements by hand and presence requirements. */
function randomDay(random: (below: number) => number): CrewingQuestion<string> {
  const personIds = Array.from({ length: random(8) + 1 }, (_, index) => `p${index}`)
  const duties = Array.from({ length: random(4) + 1 }, (_, index) => `d${index}`)
  const slots = duties.map(duty => ({ duty, count: random(3) }))
  const pairs = personIds.flatMap(personId => duties.flatMap((duty): CrewingPair[] => {
    const kind = random(4)
    return kind === 0 ? [] : [{ personId, duty, state: kind === 1 ? 'cleared' : kind === 2 ? 'learning' : 'notCleared', fix: random(2) === 0 ? null : { minutes: random(200) + 1, modules: [duty] } }]
  }))
  const free = [...personIds]
  const locked = slots.flatMap(({ duty, count }) => (count > 0 && random(3) === 0 ? [{ duty, personId: free.splice(random(free.length), 1)[0]! }] : [])).filter(place => place.personId !== undefined)
  const presence = ['first-aid-cpr', 'competent-person'].flatMap(requirement => (random(2) === 0 ? [] : [{ requirement, metBy: ['p0', 'p5', 'elsewhere'].filter(() => random(2) === 0) }]))
  return { slots, personIds, pairs, locked, presence }
}

/** The day as a table, written anew from the rules: a place per slot; a place held by hand is that person's only, and they have no other. */
function tableOf({ slots, personIds, pairs, locked = [] }: CrewingQuestion<string>, costOfPair: (pair: CrewingPair) => number | null): Costs {
  return slots.flatMap(({ duty, count }) => Array.from({ length: count }, (_, index) => {
    const keeper = locked.filter(place => place.duty === duty)[index]?.personId
    return personIds.map((personId) => {
      if (keeper === undefined ? locked.some(place => place.personId === personId) : keeper !== personId) return null
      const pair = pairs.find(one => one.personId === personId && one.duty === duty)
      return pair ? costOfPair(pair) : null
    })
  }))
}

describe('a day’s crewing with placements by hand and people who must be present', () => {
  it('is crewed, short and mended exactly as munkres, HiGHS and trying everything say, 1,500 days', () => {
    const random = randomFrom(14)
    const seen = { crewed: 0, short: 0, mended: 0, absent: 0 }
    for (let round = 0; round < 1500; round += 1) {
      const day = randomDay(random)
      const answer = crewingOf(day)
      const places = day.slots.reduce((sum, slot) => sum + slot.count, 0)
      const cleared = tableOf(day, pair => (pair.state === 'cleared' ? 0 : null))
      const fixed = tableOf(day, pair => (pair.state === 'cleared' ? 0 : pair.fix?.minutes ?? null))
      const count = (list: readonly { count: number }[]) => list.reduce((sum, slot) => sum + slot.count, 0)
      const missing = (day.presence ?? []).filter(one => !one.metBy.some(id => day.personIds.includes(id))).map(one => one.requirement)
      const [filled] = byTrying(cleared)
      expect(places - count(answer.short)).toBe(filled)
      expect(answer.presenceMissing).toEqual(missing)
      expect(answer.crewed).toBe(filled === places && missing.length === 0)
      for (const { duty, personId } of day.locked ?? []) expect(answer.assignment.filter(place => place.personId === personId && place.duty !== duty)).toEqual([])
      seen.crewed += answer.crewed ? 1 : 0
      seen.absent += missing.length > 0 ? 1 : 0
      if (filled < places) {
        seen.short += 1
        const [mended, minutes] = byMunkres(fixed)
        expect(byTrying(fixed)).toEqual([mended, minutes])
        if (round % 4 === 0) expect(byHighs(fixed)).toEqual([mended, minutes])
        expect(count(answer.unfillable)).toBe(places - mended)
        expect(answer.fix?.minutes ?? 0).toBe(minutes)
        seen.mended += answer.fix ? 1 : 0
        const { duties, people } = answer.because!
        const able = day.personIds.filter(id => !(day.locked ?? []).some(place => place.personId === id && !duties.includes(place.duty)) && day.pairs.some(pair => pair.personId === id && pair.state === 'cleared' && duties.includes(pair.duty)))
        expect(people.every(id => able.includes(id))).toBe(true)
      }
    }
    for (const times of Object.values(seen)) expect(times).toBeGreaterThan(50)
  }, 120_000)
})
