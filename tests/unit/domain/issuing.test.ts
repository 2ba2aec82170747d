import { describe, expect, it } from 'vitest'
import { halvesToIssue, isHalfFresh, type HandsOn } from '#shared/domain/issuing'

const quiz = { id: 'q', doneOn: '2028-02-01' }
const handsOn = (id: string, doneOn: string, passed = true): HandsOn => ({ id, doneOn, passed })
const ask = (change: Partial<Parameters<typeof halvesToIssue>[0]>) =>
  halvesToIssue({ passedQuizzes: [quiz], handsOns: [handsOn('h', '2028-02-10')], hasChecklist: true, today: '2028-02-10', ...change })

describe('a credential of a module', () => {
  it('is issued from quiz and hands-on together', () => {
    expect(ask({})).toEqual({ attemptId: 'q', signOffId: 'h' })
  })

  it('is not issued from one half alone', () => {
    expect(ask({ handsOns: [] })).toBeNull()
    expect(ask({ passedQuizzes: [] })).toBeNull()
  })

  it('needs the quiz only where there is no hands-on', () => {
    expect(ask({ hasChecklist: false, handsOns: [] })).toEqual({ attemptId: 'q', signOffId: null })
  })

  it('follows the newest hands-on: one that failed afterwards takes back an earlier one', () => {
    expect(ask({ handsOns: [handsOn('h', '2028-02-08'), handsOn('later', '2028-02-10', false)] })).toBeNull()
    expect(ask({ handsOns: [handsOn('h', '2028-02-08', false), handsOn('later', '2028-02-10')] })).toEqual({ attemptId: 'q', signOffId: 'later' })
  })

  it('takes a quiz from up to 90 days ago, over a leap day', () => {
    expect(isHalfFresh(quiz, '2028-04-30')).toBe(true)
    expect(isHalfFresh(quiz, '2028-05-01')).toBe(true)
    expect(isHalfFresh(quiz, '2028-05-02')).toBe(false)
    expect(ask({ handsOns: [handsOn('h', '2028-05-02')], today: '2028-05-02' })).toBeNull()
  })
})
