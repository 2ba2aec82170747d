import { addMinutes, compareInstants, type Instant } from './dates'

/** A finished attempt, as far as the next opening depends on it. */
export interface FinishedAttempt {
  submittedAt: Instant
  passed: boolean
  /** Slugs of the lessons whose items were not wholly right. */
  missedLessons: readonly string[]
}

/** Whether the quiz can be taken now. */
export type QuizOpening
  = | { isOpen: true }
    | {
      isOpen: false
      /** The soonest that it can open: the pause after the last fail. It may have come already while lessons are still to be read. */
      opensAt: Instant
      /** Slugs of the lessons to read again first, in the order missed. */
      lessonsToRead: string[]
    }

/** What the opening depends on. */
export interface QuizOpeningQuestion {
  attempts: readonly FinishedAttempt[]
  /** When each lesson was last read, by slug. */
  lastReadAt: ReadonlyMap<string, Instant>
  /** Five minutes with an assessor, recorded: opens the quiz at once. */
  assessorAt?: Instant | null
  pauseMinutes: number
  now: Instant
}

/**
 * After two fails in a row the quiz opens again when every lesson missed in them has been read again since the
 * last fail, and no sooner than the pause after it; on that instant it is open. Each further fail pauses it again.
 * A pass, or a talk with an assessor since the last fail, ends the pause.
 */
export function quizOpening({ attempts, lastReadAt, assessorAt, pauseMinutes, now }: QuizOpeningQuestion): QuizOpening {
  const inOrder = [...attempts].sort((first, second) => compareInstants(first.submittedAt, second.submittedAt))
  const [before, last] = inOrder.slice(-2)
  if (!before || !last || before.passed || last.passed) return { isOpen: true }
  if (assessorAt && compareInstants(assessorAt, last.submittedAt) >= 0) return { isOpen: true }
  const opensAt = addMinutes(last.submittedAt, pauseMinutes)
  const missed = [...new Set([...before.missedLessons, ...last.missedLessons])]
  const lessonsToRead = missed.filter((lesson) => {
    const readAt = lastReadAt.get(lesson)
    return readAt === undefined || compareInstants(readAt, last.submittedAt) <= 0
  })
  const isOpen = lessonsToRead.length === 0 && compareInstants(now, opensAt) >= 0
  return isOpen ? { isOpen } : { isOpen: false, opensAt, lessonsToRead }
}
