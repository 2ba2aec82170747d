import { describe, expect, it } from 'vitest'
import { quizOpening, type QuizOpeningQuestion } from '#shared/domain/quiz-opening'

const failAt = (submittedAt: string, missedLessons: string[] = ['seat-every-block']) => ({ submittedAt, passed: false, missedLessons })
const passAt = (submittedAt: string) => ({ submittedAt, passed: true, missedLessons: [] })
const readAgain = new Map([['seat-every-block', '2026-12-01T15:05:00Z']])

function ask(changes: Partial<QuizOpeningQuestion> = {}) {
  return quizOpening({
    attempts: [failAt('2026-12-01T14:30:00Z'), failAt('2026-12-01T15:00:00Z')],
    lastReadAt: readAgain, pauseMinutes: 20, now: '2026-12-01T15:20:00Z', ...changes,
  })
}

describe('the quiz', () => {
  it('is open at first, after one fail, and after a pass', () => {
    expect(ask({ attempts: [] })).toEqual({ isOpen: true })
    expect(ask({ attempts: [failAt('2026-12-01T15:00:00Z')], now: '2026-12-01T15:00:01Z' })).toEqual({ isOpen: true })
    expect(ask({ attempts: [failAt('2026-12-01T14:00:00Z'), passAt('2026-12-01T14:30:00Z'), failAt('2026-12-01T15:00:00Z')] })).toEqual({ isOpen: true })
  })

  it('is paused after two fails in a row until the pause is over, and open on that instant', () => {
    expect(ask({ now: '2026-12-01T15:19:59Z' })).toEqual({ isOpen: false, opensAt: '2026-12-01T15:20:00Z', lessonsToRead: [] })
    expect(ask({ now: '2026-12-01T15:20:00.000Z' })).toEqual({ isOpen: true })
  })

  it('stays paused until the missed lessons of both fails have been read again', () => {
    const attempts = [failAt('2026-12-01T14:30:00Z', ['stop-height']), failAt('2026-12-01T15:00:00Z')]
    expect(ask({ attempts, now: '2026-12-02T15:00:00Z' }))
      .toEqual({ isOpen: false, opensAt: '2026-12-01T15:20:00Z', lessonsToRead: ['stop-height'] })
    expect(ask({ attempts, lastReadAt: new Map([...readAgain, ['stop-height', '2026-12-01T15:01:00Z']]) })).toEqual({ isOpen: true })
  })

  it('does not count reading before the last fail', () => {
    const lastReadAt = new Map([['seat-every-block', '2026-12-01T14:59:00Z']])
    expect(ask({ lastReadAt })).toMatchObject({ isOpen: false, lessonsToRead: ['seat-every-block'] })
  })

  it('is paused again by every further fail', () => {
    const attempts = [failAt('2026-12-01T14:30:00Z'), failAt('2026-12-01T15:00:00Z'), failAt('2026-12-01T15:30:00Z')]
    expect(ask({ attempts, now: '2026-12-01T15:31:00Z' })).toMatchObject({ isOpen: false, opensAt: '2026-12-01T15:50:00Z' })
  })

  it('opens at once after five minutes with an assessor, but not by ones before the last fail', () => {
    expect(ask({ assessorAt: '2026-12-01T15:02:00Z', lastReadAt: new Map(), now: '2026-12-01T15:02:00Z' })).toEqual({ isOpen: true })
    expect(ask({ assessorAt: '2026-12-01T14:45:00Z', now: '2026-12-01T15:02:00Z' })).toMatchObject({ isOpen: false })
  })

  it('takes the attempts in order of time, however the list is sorted', () => {
    expect(ask({ attempts: [failAt('2026-12-01T15:00:00Z'), passAt('2026-12-01T14:00:00Z'), failAt('2026-12-01T14:30:00Z')], now: '2026-12-01T15:01:00Z' }))
      .toMatchObject({ isOpen: false })
  })
})
