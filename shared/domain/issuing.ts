import { addDays, type CalendarDate } from './dates'

/**
 * How long one half of a module waits for the other: a passed quiz for its hands-on, or a hands-on for its quiz.
 * A company rule: what was known in spring says little in autumn.
 */
export const DAYS_BETWEEN_HALVES = 90

/** One half of a module that no credential was issued from yet. */
export interface Half {
  id: string
  /** The company's date on which it was done. */
  doneOn: CalendarDate
}

/** A hands-on, passed or not. */
export interface HandsOn extends Half {
  passed: boolean
}

/** What a credential is issued from. */
export interface Halves {
  attemptId: string
  /** Null for a module without a hands-on. */
  signOffId: string | null
}

/** True while a passed quiz or hands-on still counts toward the credential: on the day itself and 90 days on. */
export function isHalfFresh(half: Pick<Half, 'doneOn'>, today: CalendarDate): boolean {
  return today <= addDays(half.doneOn, DAYS_BETWEEN_HALVES)
}

/**
 * What a module's credential can be issued from today, or null. `passedQuizzes` and `handsOns` are the unused ones,
 * in the order done; the newest of each decides, so a hands-on that failed afterwards takes back an earlier one.
 */
export function halvesToIssue(
  { passedQuizzes, handsOns, hasChecklist, today }:
  { passedQuizzes: readonly Half[], handsOns: readonly HandsOn[], hasChecklist: boolean, today: CalendarDate },
): Halves | null {
  const quiz = passedQuizzes.at(-1)
  if (!quiz || !isHalfFresh(quiz, today)) return null
  if (!hasChecklist) return { attemptId: quiz.id, signOffId: null }
  const handsOn = handsOns.at(-1)
  if (!handsOn || !handsOn.passed || !isHalfFresh(handsOn, today)) return null
  return { attemptId: quiz.id, signOffId: handsOn.id }
}
