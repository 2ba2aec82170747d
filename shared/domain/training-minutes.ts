import { compareInstants, epochSecondsOf, type Instant } from './dates'

/** What took the time. */
export const trainingKinds = ['lesson', 'quiz', 'handsOn', 'assessorTalk'] as const
export type TrainingKind = (typeof trainingKinds)[number]

/** Minutes of the talk with an assessor that opens a paused quiz (company rule). */
export const ASSESSOR_TALK_MINUTES = 5

/** Minutes that a step of a hands-on takes on the wall, practice and check together (company rule, no source). */
export const MINUTES_PER_HANDS_ON_STEP = 3

/** Minutes from the start of a quiz to its submission: every begun minute counts, at most the time it may run. */
export const quizMinutes = (startedAt: Instant, submittedAt: Instant, most: number) =>
  Math.min(most, Math.max(1, Math.ceil((epochSecondsOf(submittedAt) - epochSecondsOf(startedAt)) / 60)))

/**
 * Whether reading a lesson is required, so that its minutes count: the first time; again after each quiz that was
 * not passed; and again to renew a card that is due soon or over. Reading on for interest does not count twice.
 */
export function isReadingCounted({ lastCountedAt, lastFailedAt, isRenewing }: {
  lastCountedAt: Instant | null
  lastFailedAt: Instant | null
  /** The card is due soon or expired, and this lesson was last counted before it was issued. */
  isRenewing: boolean
}): boolean {
  if (lastCountedAt === null) return true
  return isRenewing || (lastFailedAt !== null && compareInstants(lastFailedAt, lastCountedAt) > 0)
}
