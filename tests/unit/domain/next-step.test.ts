import { describe, expect, it } from 'vitest'
import { nextStepAt } from '#shared/domain/next-step'

const lessons = (...read: boolean[]) => read.map((isRead, index) => ({ slug: `l${index + 1}`, read: isRead }))

describe('the one thing to do next at a block', () => {
  it('is the first lesson that was not read', () => {
    expect(nextStepAt({ state: 'open', lessons: lessons(false, false) })).toEqual({ kind: 'lesson', lesson: 'l1', number: 1, total: 2 })
    expect(nextStepAt({ state: 'started', lessons: lessons(true, false, true) })).toEqual({ kind: 'lesson', lesson: 'l2', number: 2, total: 3 })
  })

  it('is the quiz when every lesson was read', () => {
    expect(nextStepAt({ state: 'started', lessons: lessons(true, true) })).toEqual({ kind: 'quiz' })
  })

  it('is the hands-on after the quiz, and the card at the end', () => {
    expect(nextStepAt({ state: 'passed', lessons: lessons(false) })).toEqual({ kind: 'handsOn' })
    expect(nextStepAt({ state: 'laid', lessons: lessons(false) })).toEqual({ kind: 'card' })
  })

  it('is nothing while the block waits or is not written', () => {
    expect(nextStepAt({ state: 'waiting', lessons: lessons(false) })).toEqual({ kind: 'nothing' })
    expect(nextStepAt({ state: 'unwritten', lessons: [] })).toEqual({ kind: 'nothing' })
  })
})
