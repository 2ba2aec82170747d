import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { drawAttempt } from '#shared/domain/drawing-of-items'
import { numbersFrom, shuffled } from '#shared/domain/seeded-numbers'
import { aBank, aNumber, anOrder, aOne, aPlace } from './builders/items'

const ids = (drawn: readonly { id: string }[]) => drawn.map(item => item.id)
const mustKnow = ['item-01', 'item-02', 'item-03', 'item-04', 'item-05']

describe('drawing an attempt', () => {
  it('gives the same attempt for the same seed, also when the bank’s file is sorted otherwise', () => {
    const bank = aBank()
    expect(drawAttempt(bank, 'seed')).toEqual(drawAttempt({ ...bank, items: [...bank.items].reverse() }, 'seed'))
  })

  it('gives another attempt for another seed', () => {
    const attempts = Array.from({ length: 40 }, (_, index) => ids(drawAttempt(aBank(), `seed ${index}`)).join())
    expect(new Set(attempts).size).toBe(40)
  })

  it('does not change the bank', () => {
    const bank = aBank()
    const before = JSON.stringify(bank)
    drawAttempt(bank, 'seed')
    expect(JSON.stringify(bank)).toBe(before)
  })

  it('never draws a struck item, not even a must-know one', () => {
    fc.assert(fc.property(fc.string(), fc.subarray(ids(aBank().items)), (seed, struck) => {
      const drawn = ids(drawAttempt(aBank(), seed, new Set(struck)))
      expect(drawn.filter(id => struck.includes(id))).toEqual([])
      expect(drawn).toHaveLength(Math.min(24 - struck.length, Math.max(10, mustKnow.filter(id => !struck.includes(id)).length)))
    }))
  })

  it('always holds every must-know item, no item twice, and the length of the quiz', () => {
    fc.assert(fc.property(fc.string(), (seed) => {
      const drawn = ids(drawAttempt(aBank(), seed))
      expect(mustKnow.filter(id => !drawn.includes(id))).toEqual([])
      expect(new Set(drawn).size).toBe(10)
    }))
  })

  it('spreads over the lessons: none has two items more than another', () => {
    fc.assert(fc.property(fc.string(), (seed) => {
      const bank = aBank()
      const drawn = ids(drawAttempt(bank, seed))
      const counts = [0, 1, 2, 3].map(lesson => bank.items.filter(item => drawn.includes(item.id) && item.lesson === `lesson-${lesson}`).length)
      expect(Math.max(...counts) - Math.min(...counts)).toBeLessThanOrEqual(1)
    }))
  })

  it('holds every must-know item also when there are more than the quiz is long', () => {
    expect(ids(drawAttempt(aBank({ quizLength: 3 }), 'seed')).sort()).toEqual(mustKnow)
  })

  it('gives what there is when the bank is short', () => {
    expect(ids(drawAttempt(aBank({ items: [aOne()] }), 'seed'))).toEqual(['one'])
    expect(drawAttempt(aBank({ items: [] }), 'seed')).toEqual([])
  })
})

describe('the options of a drawn item', () => {
  const optionsOf = (item: ReturnType<typeof aOne>, seed: string) => drawAttempt(aBank({ items: [item] }), seed)[0]?.options ?? []

  it('are all there, in an order that the seed decides', () => {
    fc.assert(fc.property(fc.string(), (seed) => {
      expect([...optionsOf(aOne(), seed)].sort()).toEqual(['a', 'b', 'c', 'd'])
    }))
    expect(new Set(Array.from({ length: 40 }, (_, index) => optionsOf(aOne(), `seed ${index}`).join())).size).toBeGreaterThan(10)
  })

  it('of a place item keep the letters’ order, and a number has none', () => {
    expect(optionsOf(aPlace(), 'seed')).toEqual(['a', 'b', 'c', 'd', 'e'])
    expect(optionsOf(aNumber(), 'seed')).toEqual([])
  })

  it('of an order item are never shown already in order', () => {
    fc.assert(fc.property(fc.string(), (seed) => {
      expect(optionsOf(anOrder(), seed)).not.toEqual(['c', 'a', 'd', 'b', 'e'])
    }), { numRuns: 2000 })
  })
})

describe('numbers from a seed', () => {
  it('are the same on every machine', () => {
    const next = numbersFrom('pourwright')
    expect(Array.from({ length: 8 }, () => next(100))).toEqual([35, 86, 18, 52, 10, 21, 93, 2])
  })

  it('lie below the bound and reach every value', () => {
    const next = numbersFrom('spread')
    const counts = [0, 0, 0, 0, 0, 0]
    for (let turn = 0; turn < 6000; turn += 1) {
      const drawn = next(6)
      counts[drawn] = (counts[drawn] ?? 0) + 1
    }
    expect(counts).toHaveLength(6)
    expect(counts.every(count => count > 850 && count < 1150)).toBe(true)
  })

  it('refuse a bound that is not a whole number above zero', () => {
    expect(() => numbersFrom('x')(0)).toThrow(RangeError)
    expect(() => numbersFrom('x')(1.5)).toThrow(RangeError)
  })

  it('shuffle into every order about equally often', () => {
    const next = numbersFrom('orders')
    const counts = new Map<string, number>()
    for (let turn = 0; turn < 2400; turn += 1) {
      const order = shuffled(['a', 'b', 'c', 'd'], next).join('')
      counts.set(order, (counts.get(order) ?? 0) + 1)
    }
    expect(counts.size).toBe(24)
    expect(Math.min(...counts.values())).toBeGreaterThan(60)
  })
})
