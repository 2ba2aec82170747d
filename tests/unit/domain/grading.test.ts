import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { attemptResult, gradeItem, passWithout, toServedItem } from '#shared/domain/grading'
import { type Answer, type BankItem, keyProblem } from '#shared/domain/quiz-bank'
import { aBank, aNumber, anAll, anOrder, aOne, aPlace } from './builders/items'

const share = (item: BankItem, answer: Answer | null | undefined) => gradeItem(item, answer).share

describe('one of, and place', () => {
  it('are right or wrong', () => {
    expect(share(aOne(), 'b')).toBe(1)
    expect(share(aOne(), 'a')).toBe(0)
    expect(share(aPlace(), 'd')).toBe(1)
    expect(share(aPlace(), 'e')).toBe(0)
  })

  it('are wrong without an answer or with one of another kind', () => {
    for (const answer of [undefined, null, '', ['b'], 2, { value: 2 }]) expect(share(aOne(), answer)).toBe(0)
  })
})

describe('all of', () => {
  it.each<[string[], number]>([
    [['a', 'c', 'd'], 1], [['d', 'a', 'c'], 1], [['a', 'c'], 2 / 3], [['a', 'c', 'd', 'b'], 2 / 3], [['a'], 1 / 3], [['a', 'b'], 0],
    [['b', 'e'], 0], [['a', 'b', 'e'], 0], [[], 0], [['a', 'b', 'c', 'd', 'e'], 1 / 3], [['a', 'a', 'a'], 1 / 3], [['a', 'c', 'd', 'nowhere'], 2 / 3],
  ])('%j is worth %d', (picks, expected) => {
    expect(share(anAll(), picks)).toBeCloseTo(expected, 12)
  })

  it('must be exactly right where it is a must-know', () => {
    expect(share(anAll({ mustKnow: true }), ['a', 'c'])).toBe(0)
    expect(share(anAll({ mustKnow: true }), ['a', 'c', 'd', 'b'])).toBe(0)
    expect(share(anAll({ mustKnow: true }), ['c', 'd', 'a'])).toBe(1)
  })
})

describe('order', () => {
  it.each<[string[], number]>([
    [['c', 'a', 'd', 'b', 'e'], 1], [['a', 'd', 'b', 'e', 'c'], 3 / 4], [['c', 'a', 'b', 'd', 'e'], 1 / 4], [['e', 'b', 'd', 'a', 'c'], 0],
    [['d', 'b', 'e', 'c', 'a'], 3 / 4], [['c', 'a', 'd', 'b'], 0], [['c', 'a', 'd', 'b', 'b'], 0], [['c', 'a', 'd', 'b', 'x'], 0], [[], 0],
  ])('%j is worth %d', (picks, expected) => {
    expect(share(anOrder(), picks)).toBe(expected)
  })

  it('must be exact where it is a must-know', () => {
    expect(share(anOrder({ mustKnow: true }), ['a', 'd', 'b', 'e', 'c'])).toBe(0)
    expect(share(anOrder({ mustKnow: true }), ['c', 'a', 'd', 'b', 'e'])).toBe(1)
  })
})

describe('a number', () => {
  it('is right within the tolerance, both bounds included', () => {
    for (const value of [10.95, 11, 11.25, 11.55, '11.55', '11,55', '10,95']) expect(share(aNumber(), value)).toBe(1)
    for (const value of [10.94, 11.56, '10.949999', '11,5500001']) expect(share(aNumber(), value)).toBe(0)
  })

  it('is compared as a decimal, where binary fractions would miss the bound', () => {
    const item = aNumber({ key: { value: 0.3, tolerance: 0.1 } })
    expect(Math.abs(0.4 - 0.3) <= 0.1).toBe(false)
    expect(share(item, 0.4)).toBe(1)
    expect(share(item, '0,2')).toBe(1)
  })

  it('may have a relative tolerance, also below zero', () => {
    const item = aNumber({ unit: 'degF', units: ['degF', 'degC'], key: { value: -40, tolerance: 0.1, relative: true } })
    expect(share(item, -44)).toBe(1)
    expect(share(item, -44.1)).toBe(0)
    expect(share(item, { value: -40, unit: 'degC' })).toBe(1)
  })

  it('is converted exactly before it is compared', () => {
    expect(share(aNumber(), { value: '285,75', unit: 'mm' })).toBe(1)
    expect(share(aNumber(), { value: 293.37, unit: 'mm' })).toBe(1)
    expect(share(aNumber(), { value: 293.38, unit: 'mm' })).toBe(0)
    expect(share(aNumber(), { value: 11.25 })).toBe(1)
  })

  it('in a unit that was not offered is wrong, and says so', () => {
    expect(gradeItem(aNumber(), { value: 28.575, unit: 'cm' })).toEqual({ id: 'number', share: 0, unread: 'wrongUnit' })
    expect(gradeItem(aNumber(), { value: 11.25, unit: 'lb' })).toMatchObject({ unread: 'wrongUnit' })
    expect(gradeItem(aNumber(), { value: 11.25, unit: 'cubit' })).toMatchObject({ unread: 'wrongUnit' })
  })

  it('that cannot be read is wrong, and says why', () => {
    expect(gradeItem(aNumber({ key: { value: 1234, tolerance: 0 } }), '1,234')).toEqual({ id: 'number', share: 0, unread: 'ambiguous' })
    expect(gradeItem(aNumber(), 'about eleven')).toMatchObject({ share: 0, unread: 'notANumber' })
    expect(gradeItem(aNumber(), ['11.25'])).toMatchObject({ share: 0, unread: 'notANumber' })
    expect(gradeItem(aNumber(), null)).toEqual({ id: 'number', share: 0 })
  })
})

describe('the result of an attempt', () => {
  const items = Array.from({ length: 10 }, (_, index) => aOne({ id: `i${index}`, mustKnow: index === 0 }))
  const result = (right: readonly number[], passMark = 0.8) => attemptResult({
    items, passMark, answers: new Map(items.map((item, index) => [item.id, right.includes(index) ? 'b' : 'c'])),
  })

  it('is a pass on the pass mark and a fail below it', () => {
    expect(result([0, 1, 2, 3, 4, 5, 6, 7])).toMatchObject({ score: 0.8, passed: true, mustKnowMissed: [] })
    expect(result([0, 1, 2, 3, 4, 5, 6])).toMatchObject({ score: 0.7, passed: false })
  })

  it('is a fail with a must-know item missed, whatever the score', () => {
    expect(result([1, 2, 3, 4, 5, 6, 7, 8, 9])).toMatchObject({ score: 0.9, passed: false, mustKnowMissed: ['i0'] })
  })

  it('counts unanswered items as wrong, and answers to other items not at all', () => {
    const answers = new Map<string, Answer>([['i0', 'b'], ['elsewhere', 'b']])
    expect(attemptResult({ items, passMark: 0.8, answers })).toMatchObject({ score: 0.1, passed: false })
  })

  it('is on the pass mark when thirds add up to it', () => {
    const thirds = [anAll({ id: '1' }), anAll({ id: '2' }), anAll({ id: '3' }), aOne({ id: '4' }), aOne({ id: '5' })]
    const answers = new Map<string, Answer>([['1', ['a', 'c']], ['2', ['a', 'c']], ['3', ['a', 'c']], ['4', 'b'], ['5', 'b']])
    expect(attemptResult({ items: thirds, passMark: 0.8, answers }).passed).toBe(true)
  })

  it('without items is no pass', () => {
    expect(attemptResult({ items: [], passMark: 0, answers: new Map() })).toEqual({ score: 0, passed: false, mustKnowMissed: [], items: [] })
  })
})

describe('what a learner is served', () => {
  const keys = (value: object) => Object.keys(value).sort()

  it('holds no key, feedback, source, lesson or must-know mark', () => {
    for (const item of aBank().items) {
      const served = toServedItem(Object.assign({ notes: 'Feedback' }, item), 'en')
      const extra = keys(served).filter(key => !['id', 'kind', 'options', 'picture', 'stem', 'unit', 'units'].includes(key))
      expect(extra).toEqual([])
      expect((served.options ?? []).flatMap(keys).filter(key => key !== 'id' && key !== 'text')).toEqual([])
      expect(JSON.stringify(served)).not.toMatch(/Feedback|common practice|tolerance|lesson-/)
    }
  })

  it('is in one language, options in the order drawn', () => {
    expect(toServedItem(aOne(), 'es', ['d', 'b', 'a', 'c'])).toEqual({
      id: 'one', kind: 'one', stem: 'Stem (es)',
      options: ['d', 'b', 'a', 'c'].map(id => ({ id, text: `Option ${id} (es)` })),
    })
  })

  it('names the unit of a number and those it may be answered in', () => {
    expect(toServedItem(aNumber(), 'en')).toEqual({ id: 'number', kind: 'number', stem: 'Stem', unit: 'in', units: ['in', 'mm'] })
    expect(toServedItem(aNumber({ units: undefined }), 'en').units).toEqual(['in'])
  })
})

describe('the key of an item', () => {
  it('is sound in the bank', () => {
    expect(aBank().items.map(keyProblem).filter(problem => problem !== null)).toEqual([])
  })

  it('is found out when it points nowhere, is empty, repeats, or leaves steps out', () => {
    expect(keyProblem({ ...aOne(), key: 'z' } as BankItem)).toBe('noSuchOption')
    expect(keyProblem({ ...anAll(), key: [] as string[] } as BankItem)).toBe('emptyKey')
    expect(keyProblem({ ...anAll(), key: ['a', 'a'] } as BankItem)).toBe('repeatedOption')
    expect(keyProblem({ ...anOrder(), key: ['a', 'b'] } as BankItem)).toBe('notEveryOption')
    expect(keyProblem(aNumber({ key: { value: 1, tolerance: -1 } }))).toBe('badNumber')
  })
})

describe('for any answer', () => {
  const anyAnswer: fc.Arbitrary<Answer> = fc.oneof(
    fc.string(), fc.double(), fc.subarray(['a', 'b', 'c', 'd', 'e']), fc.shuffledSubarray(['a', 'b', 'c', 'd', 'e']), fc.array(fc.string()),
    fc.record({ value: fc.oneof(fc.string(), fc.double()), unit: fc.constantFrom('in', 'mm', 'lb', '?') }),
  )

  it('the share lies from 0 to 1, and a must-know item gives all or nothing', () => {
    fc.assert(fc.property(fc.constantFrom(aOne, anAll, anOrder, aNumber, aPlace), fc.boolean(), anyAnswer, (make, mustKnow, answer) => {
      const got = share(make({ mustKnow }), answer)
      expect(got >= 0 && got <= 1).toBe(true)
      if (mustKnow) expect([0, 1]).toContain(got)
    }))
  })

  it('the share is 1 only when it is the key', () => {
    fc.assert(fc.property(fc.shuffledSubarray(['a', 'b', 'c', 'd', 'e']), (picks) => {
      expect(share(anOrder(), picks) === 1).toBe(picks.join() === 'c,a,d,b,e')
      expect(share(anAll(), picks) === 1).toBe([...picks].sort().join() === 'a,c,d')
    }))
  })
})

describe('a result without struck items', () => {
  const items = [aOne({ id: 'must', mustKnow: true }), ...['a', 'b', 'c', 'd'].map(id => aOne({ id }))]
  const graded = (wrong: string[]) => attemptResult({ items, answers: new Map(items.map(item => [item.id, wrong.includes(item.id) ? 'a' : 'b'])), passMark: 0.8 })
  const without = (wrong: string[], ...struck: string[]) => passWithout(graded(wrong), new Set(struck), { items, passMark: 0.8 })

  it('becomes a pass when only a struck must-know item was in the way, and still shows the item', () => {
    const result = without(['must'], 'must')
    expect(result).toMatchObject({ passed: true, score: 1, mustKnowMissed: [], struck: ['must'] })
    expect(result.items).toEqual(graded(['must']).items)
  })

  it('becomes a pass when the score of the others is enough', () => {
    expect(graded(['a', 'b'])).toMatchObject({ passed: false, score: 0.6 })
    expect(without(['a', 'b'], 'a')).toMatchObject({ passed: false, score: 0.6 })
    expect(without(['a', 'b'], 'a', 'b')).toMatchObject({ passed: true, score: 1, struck: ['a', 'b'] })
  })

  it('stays as it was while it fails, when it passed, when the item was not served, and when nothing is left', () => {
    expect(without(['must', 'a'], 'a')).toEqual(graded(['must', 'a']))
    expect(without(['a'], 'b')).toEqual(graded(['a']))
    expect(without(['must'], 'elsewhere')).toEqual(graded(['must']))
    expect(without(['must'], 'must', 'a', 'b', 'c', 'd')).toEqual(graded(['must']))
  })

  it('never turns a pass into a fail, nor takes from a score, whatever is struck', () => {
    fc.assert(fc.property(fc.subarray(items.map(item => item.id)), fc.subarray(items.map(item => item.id)), (wrong, struck) => {
      const [before, after] = [graded(wrong), without(wrong, ...struck)]
      expect(Number(after.passed)).toBeGreaterThanOrEqual(Number(before.passed))
      expect(after.score).toBeGreaterThanOrEqual(before.score)
    }))
  })
})
