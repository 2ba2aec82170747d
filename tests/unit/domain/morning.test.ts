import { describe, expect, it } from 'vitest'
import { type DutyToday, morningOf, usualWork } from '#shared/domain/morning'
import type { MissingReason } from '#shared/domain/states'

const cleared = (duty: string): DutyToday => ({ duty, state: 'cleared', until: null, missing: [] })
const learning = (duty: string): DutyToday => ({ duty, state: 'learning', until: null, missing: [] })
const stopped = (duty: string, ...kinds: MissingReason[]): DutyToday => ({ duty, state: 'notCleared', until: null, missing: kinds.map(kind => ({ anyOf: [], why: { kind }, fix: { kind: 'none' } })) })

describe('morningOf', () => {
  it('clears somebody who may do one of the crew\'s duties and never held the others', () => {
    expect(morningOf([cleared('stacker'), stopped('hose-hand', 'neverHeld')])).toEqual({ state: 'cleared', stops: [] })
  })

  it.each(['expired', 'notVerified', 'withdrawn', 'rejected', 'onHold'] as const)('stops somebody whose %s credential closes one duty, cleared for another or not', (why) => {
    const lost = stopped('hose-hand', why)
    expect(morningOf([cleared('stacker'), lost])).toEqual({ state: 'notCleared', stops: [lost] })
  })

  it('calls learning beside whoever may do nothing alone', () => {
    expect(morningOf([stopped('hose-hand', 'neverHeld'), learning('stacker')])).toMatchObject({ state: 'learning', stops: [{ duty: 'stacker' }] })
  })

  it('names the duty with the least missing when there is none', () => {
    expect(morningOf([stopped('a', 'neverHeld', 'neverHeld'), stopped('b', 'neverHeld')]).stops.map(duty => duty.duty)).toEqual(['b'])
  })

  it('says nothing about somebody without duties', () => {
    expect(morningOf([])).toEqual({ state: null, stops: [] })
  })
})

it('plans no pour from pour duties alone', () => {
  expect(usualWork(['stacker', 'hose-hand', 'stacker', 'brace-hand', 'own-duty'])).toEqual(['stack', 'brace'])
})
