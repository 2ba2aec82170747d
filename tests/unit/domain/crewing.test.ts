import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import type { Clearance } from '#shared/domain/clearance'
import { crewingOf, type CrewingPair, type CrewingQuestion, lockProblem } from '#shared/domain/crewing'
import type { Missing } from '#shared/domain/missing'
import { sameDayFixOf } from '#shared/domain/same-day-fix'

/** "ann: stacker hose-hand" makes two cleared pairs; "~stacker" is learning; "stacker+45" can be fixed in 45 minutes. */
function pairsOf(...lines: string[]): CrewingPair[] {
  return lines.flatMap((line) => {
    const [personId = '', duties = ''] = line.split(':')
    return duties.trim().split(' ').filter(word => word !== '').map((word) => {
      const [code = '', minutes] = word.split('+')
      const duty = code.replace('~', '')
      const state = code.startsWith('~') ? 'learning' : minutes === undefined ? 'cleared' : 'notCleared'
      return { personId, duty, state, fix: minutes === undefined ? null : { minutes: Number(minutes), modules: [duty] } }
    })
  })
}

function ask(slots: Record<string, number>, lines: string[], changes: Partial<CrewingQuestion<string>> = {}) {
  return crewingOf<string>({
    slots: Object.entries(slots).map(([duty, count]) => ({ duty, count })),
    personIds: lines.map(line => line.split(':')[0] ?? ''), pairs: pairsOf(...lines), ...changes,
  })
}

describe('crewing', () => {
  it('is crewed when everybody can be placed, also where the first choice must move over', () => {
    expect(ask({ 'hose-hand': 1, 'stacker': 1 }, ['ann: hose-hand stacker', 'ben: hose-hand'])).toEqual({
      crewed: true, short: [], unfillable: [], presenceMissing: [], because: null, fix: null,
      assignment: [{ duty: 'hose-hand', personId: 'ben' }, { duty: 'stacker', personId: 'ann' }],
    })
  })

  it('is crewed when nothing is asked for', () => {
    expect(ask({}, ['ann: stacker']).crewed).toBe(true)
    expect(ask({ stacker: 0 }, []).crewed).toBe(true)
  })

  it('uses each person once', () => {
    expect(ask({ stacker: 2 }, ['ann: stacker'])).toMatchObject({ crewed: false, short: [{ duty: 'stacker', count: 1 }] })
  })

  it('gives the same answer however slots and people are sorted', () => {
    const lines = ['ann: stacker', 'ben: stacker hose-hand', 'cal: stacker hose-hand']
    const first = ask({ 'stacker': 1, 'hose-hand': 1 }, lines)
    const second = ask({ 'hose-hand': 1, 'stacker': 1 }, [...lines].reverse())
    expect(second).toEqual(first)
  })

  it('never fills a slot with somebody who is learning, but shows them beside the one who does', () => {
    expect(ask({ stacker: 1 }, ['ann: ~stacker']).crewed).toBe(false)
    expect(ask({ stacker: 1 }, ['ann: ~stacker', 'ben: stacker', 'cal: ~stacker']).assignment)
      .toEqual([{ duty: 'stacker', personId: 'ben' }, { duty: 'stacker', personId: 'ann', beside: 'ben' }])
  })

  it('says which duties share too few people', () => {
    const answer = ask({ 'hose-hand': 1, 'pour-lead': 1, 'stacker': 1, 'vibrator-hand': 1 },
      ['ann: hose-hand pour-lead vibrator-hand', 'ben: pour-lead vibrator-hand', 'cal: stacker'])
    expect(answer.crewed).toBe(false)
    expect(answer.because).toEqual({ duties: ['hose-hand', 'pour-lead', 'vibrator-hand'], people: ['ann', 'ben'] })
  })
})

describe('somebody who must be on site', () => {
  it('may fill a slot as well, and must be on the roster', () => {
    const presence = (metBy: string[]) => ({ presence: [{ requirement: 'first-aid-cpr', metBy }] })
    expect(ask({ stacker: 1 }, ['ann: stacker'], presence(['ann'])).crewed).toBe(true)
    expect(ask({ stacker: 1 }, ['ann: stacker', 'ben:'], presence(['ben'])).crewed).toBe(true)
    expect(ask({ stacker: 1 }, ['ann: stacker'], presence(['zoe']))).toMatchObject({ crewed: false, short: [], presenceMissing: ['first-aid-cpr'] })
  })
})

describe('a placement by hand', () => {
  it('is kept, though another would do', () => {
    const locked = [{ duty: 'stacker', personId: 'ben' }]
    expect(ask({ stacker: 1 }, ['ann: stacker', 'ben: stacker'], { locked }).assignment).toEqual([{ duty: 'stacker', personId: 'ben' }])
  })

  it('is kept even where it leaves another duty short', () => {
    const answer = ask({ 'hose-hand': 1, 'stacker': 1 }, ['ann: hose-hand stacker', 'ben: stacker'], { locked: [{ duty: 'stacker', personId: 'ann' }] })
    expect(answer).toMatchObject({ crewed: false, short: [{ duty: 'hose-hand', count: 1 }], assignment: [{ duty: 'stacker', personId: 'ann' }] })
  })

  it('of somebody not cleared keeps the slot for them and leaves it short, with their fix', () => {
    const answer = ask({ stacker: 1 }, ['ann: stacker', 'ben: stacker+45'], { locked: [{ duty: 'stacker', personId: 'ben' }] })
    expect(answer).toMatchObject({ crewed: false, short: [{ duty: 'stacker', count: 1 }], fix: { minutes: 45, steps: [{ personId: 'ben' }] } })
  })

  it('that cannot be kept is refused', () => {
    const question = { slots: [{ duty: 'stacker', count: 1 }], personIds: ['ann', 'ben'], pairs: [] }
    const problem = (locked: { duty: string, personId: string }[]) => lockProblem({ ...question, locked })
    expect(problem([{ duty: 'stacker', personId: 'zoe' }])).toBe('notRostered')
    expect(problem([{ duty: 'hose-hand', personId: 'ann' }])).toBe('noSlot')
    expect(problem([{ duty: 'stacker', personId: 'ann' }, { duty: 'stacker', personId: 'ben' }])).toBe('noSlot')
    expect(problem([{ duty: 'stacker', personId: 'ann' }, { duty: 'stacker', personId: 'ann' }])).toBe('personTwice')
    expect(problem([{ duty: 'stacker', personId: 'ann' }])).toBeNull()
    expect(() => crewingOf({ ...question, locked: [{ duty: 'hose-hand', personId: 'ann' }] })).toThrow(RangeError)
  })
})

describe('the shortest fix', () => {
  it('moves cleared people so that the cheapest training is enough', () => {
    const answer = ask({ 'hose-hand': 1, 'stacker': 1 }, ['ann: hose-hand stacker', 'ben: hose-hand+300 stacker+75'])
    expect(answer.fix).toEqual({ minutes: 75, steps: [{ personId: 'ben', duty: 'stacker', modules: ['stacker'] }] })
    expect(answer.unfillable).toEqual([])
  })

  it('names the slots that nobody here can fill', () => {
    const answer = ask({ 'hose-hand': 2, 'stacker': 1 }, ['ann: stacker+30', 'ben:'])
    expect(answer.unfillable).toEqual([{ duty: 'hose-hand', count: 2 }])
    expect(answer.fix).toEqual({ minutes: 30, steps: [{ personId: 'ann', duty: 'stacker', modules: ['stacker'] }] })
  })

  it('is none when nothing can be done today', () => {
    expect(ask({ stacker: 1 }, ['ann:'])).toMatchObject({ fix: null, unfillable: [{ duty: 'stacker', count: 1 }] })
  })

  it('makes the day crewed when it is carried out and nothing stays unfillable', () => {
    const slotsIn = (list: readonly { count: number }[]) => list.reduce((sum, { count }) => sum + count, 0)
    const word = fc.constantFrom('a', 'b', 'c', 'a+10', 'b+20', 'c+30', '~a')
    const lines = fc.array(fc.uniqueArray(word, { maxLength: 3, selector: one => one.replace(/[~+\d]/g, '') }), { maxLength: 5 })
      .map(words => words.map((list, index) => `p${index}: ${list.join(' ')}`))
    const slots = fc.record({ a: fc.nat(2), b: fc.nat(2), c: fc.nat(1) })
    fc.assert(fc.property(slots, lines, (wanted, people) => {
      const before = ask(wanted, people)
      const done = new Set((before.fix?.steps ?? []).map(step => `${step.personId} ${step.duty}`))
      const pairs = pairsOf(...people).map(pair => done.has(`${pair.personId} ${pair.duty}`) ? { ...pair, state: 'cleared' as const } : pair)
      // Slots, not lines of duties: where two fixes cost the same, the empty slots may fall to other duties.
      expect(slotsIn(ask(wanted, people, { pairs }).short)).toBe(slotsIn(before.unfillable))
      expect(before.crewed).toBe(before.short.length === 0)
      expect(before.because === null).toBe(before.crewed)
    }), { numRuns: 300, examples: [[{ a: 1, b: 2, c: 1 }, ['p0: b a', 'p1: a c']]] })
  })
})

describe('what can be mended on the day', () => {
  const missing = (fix: Missing['fix'], why: Missing['why'] = { kind: 'neverHeld' }): Missing => ({ anyOf: ['x'], why, fix })
  const fixFor = (list: Missing[], hasSameDayFix = true) => {
    const clearance: Clearance = { state: list.length === 0 ? 'cleared' : 'notCleared', until: null, missing: list, allowedFor: [] }
    return sameDayFixOf({ clearance, hasSameDayFix, date: '2026-12-01' })
  }
  const module = (name: string, minutes: number | null = 40) => ({ kind: 'module', module: name, minutes } as const)

  it('is the sum of the modules, each counted once', () => {
    expect(fixFor([missing(module('stacking')), missing({ kind: 'signOff', module: 'steel', minutes: 25 }), missing(module('stacking'))]))
      .toEqual({ minutes: 65, modules: ['stacking', 'steel'] })
    expect(fixFor([])).toEqual({ minutes: 0, modules: [] })
  })

  it('is nothing while a card, a person’s own reason or an unknown length stands in the way', () => {
    expect(fixFor([missing(module('stacking')), missing({ kind: 'card', type: 'ladders' })])).toBeNull()
    expect(fixFor([missing({ kind: 'safetyManager' }, { kind: 'onHold' })])).toBeNull()
    expect(fixFor([missing(module('stacking', null))])).toBeNull()
  })

  it('for a duty without same-day fix is only the renewal of what ran out at most 30 days ago', () => {
    const expired = (on: string) => fixFor([missing(module('pump-and-hose'), { kind: 'expired', on })], false)
    expect(expired('2026-11-30')).toEqual({ minutes: 40, modules: ['pump-and-hose'] })
    expect(expired('2026-11-01')).not.toBeNull()
    expect(expired('2026-10-31')).toBeNull()
    expect(fixFor([missing(module('pump-and-hose'))], false)).toBeNull()
  })
})
