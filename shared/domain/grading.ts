import { readNumber } from './number-answers'
import type { Answer, BankItem, NumberKey, ServedItem } from './quiz-bank'
import type { Language } from './states'
import { absolute, add, convert, fractionOf, isAtMost, isSameQuantity, isUnit, multiply, type Fraction, type Unit } from './units'

/** One item's grade: the share right from 0 to 1, and why a number could not be read. */
export interface ItemGrade {
  id: string
  share: number
  /** Only for a number that was given and could not be read; the screen should have asked again. */
  unread?: 'ambiguous' | 'notANumber' | 'wrongUnit'
}

/** The result of one attempt. */
export interface AttemptResult {
  /** Mean share over the items served, 0 to 1. */
  score: number
  passed: boolean
  /** Ids of must-know items that were not wholly right, in the order served. */
  mustKnowMissed: string[]
  items: ItemGrade[]
  /** Items that were taken out of this result: they stand in `items`, and count for nothing. */
  struck?: string[]
}

/** Closer than this, a score counts as on the pass mark: binary fractions cannot write 0.8. */
const SCORE_SLACK = 1e-9

/**
 * What a learner may see of an item before it is graded, in one language, options in the order given. Key,
 * feedback, source, lesson and the must-know mark stay behind: the answer is built up from what may leave, never
 * cut down from the whole.
 */
export function toServedItem(item: BankItem, language: Language, optionOrder?: readonly string[]): ServedItem {
  const served: ServedItem = { id: item.id, kind: item.kind, stem: item.stem[language] }
  if (item.picture !== undefined) served.picture = item.picture
  if (item.kind === 'number') return { ...served, unit: item.unit, units: item.units ?? [item.unit] }
  const order = optionOrder ?? item.options.map(option => option.id)
  const options = order.flatMap(id => item.options.filter(option => option.id === id))
  return { ...served, options: options.map(option => ({ id: option.id, text: option.text[language] })) }
}

/**
 * Grades one answer. One of and place: right or wrong. All of: exactly right for a must-know item, otherwise
 * right picks minus wrong picks over the right ones, never below 0. Order: the share of neighbours in the right
 * order, 1 only when exact; a must-know one must be exact. Number: within the tolerance after conversion, bounds
 * included. No answer, or an answer of the wrong kind, is wrong.
 */
export function gradeItem(item: BankItem, answer: Answer | null | undefined): ItemGrade {
  if (answer === null || answer === undefined) return { id: item.id, share: 0 }
  if (item.kind === 'number') return gradeNumber(item, answer)
  if (item.kind === 'one' || item.kind === 'place') return { id: item.id, share: answer === item.key ? 1 : 0 }
  const picks = isList(answer) ? answer : []
  const share = item.kind === 'all' ? shareOfPicks(picks, item.key) : shareOfNeighbours(picks, item.key)
  return { id: item.id, share: item.mustKnow && share < 1 ? 0 : share }
}

/**
 * Grades an attempt over the items it was served, answered or not. Passed: the score is at least the pass mark
 * and every must-know item is wholly right. Answers to items that were not served count for nothing.
 */
export function attemptResult(
  { items, answers, passMark }: { items: readonly BankItem[], answers: ReadonlyMap<string, Answer>, passMark: number },
): AttemptResult {
  return judge(items, items.map(item => gradeItem(item, answers.get(item.id))), passMark)
}

/**
 * A failed result without its struck items, when that makes it a pass; in every other case the result as it is. Taking
 * a question out never turns a pass into a fail, and never changes the score of an attempt that fails anyway.
 */
export function passWithout(
  result: AttemptResult, struck: ReadonlySet<string>, { items, passMark }: { items: readonly BankItem[], passMark: number },
): AttemptResult {
  const out = items.filter(item => struck.has(item.id)).map(item => item.id)
  if (result.passed || out.length === 0) return result
  const kept = items.filter(item => !struck.has(item.id))
  const grades = kept.map(item => result.items.find(grade => grade.id === item.id) ?? { id: item.id, share: 0 })
  const regraded = judge(kept, grades, passMark)
  return regraded.passed ? { ...regraded, items: result.items, struck: out } : result
}

function judge(items: readonly BankItem[], grades: ItemGrade[], passMark: number): AttemptResult {
  const total = grades.reduce((sum, grade) => sum + grade.share, 0)
  const score = items.length === 0 ? 0 : Math.min(1, total / items.length)
  const mustKnowMissed = items.filter((item, index) => item.mustKnow && (grades[index]?.share ?? 0) < 1).map(item => item.id)
  const isEnough = items.length > 0 && score >= passMark - SCORE_SLACK
  return { score, passed: isEnough && mustKnowMissed.length === 0, mustKnowMissed, items: grades }
}

/** Right picks minus wrong picks over the right ones, 0 to 1; a pick made twice counts once. */
function shareOfPicks(picks: readonly string[], key: readonly string[]): number {
  const chosen = [...new Set(picks)]
  const right = chosen.filter(id => key.includes(id)).length
  return Math.max(0, (right - (chosen.length - right)) / key.length)
}

/** The share of the key's neighbouring pairs that stand next to each other, in that order, in the answer. */
export function shareOfNeighbours(picks: readonly string[], key: readonly string[]): number {
  const isWhole = picks.length === key.length && new Set(picks).size === picks.length && picks.every(id => key.includes(id))
  if (!isWhole) return 0
  if (key.length === 1) return 1
  const pairs = key.slice(1).filter((id, index) => {
    const before = picks.indexOf(key[index] ?? '')
    return picks[before + 1] === id
  })
  return pairs.length / (key.length - 1)
}

function gradeNumber(item: Extract<BankItem, { kind: 'number' }>, answer: Answer): ItemGrade {
  const given = toNumberAnswer(answer, item.unit)
  if (given === null) return { id: item.id, share: 0, unread: 'notANumber' }
  const { value, unit } = given
  const allowed = item.units ?? [item.unit]
  if (!isUnit(unit) || (unit !== item.unit && !allowed.includes(unit)) || !isSameQuantity(unit, item.unit)) {
    return { id: item.id, share: 0, unread: 'wrongUnit' }
  }
  const read = readNumber(value)
  if (!read.isRead) return { id: item.id, share: 0, unread: read.why }
  return { id: item.id, share: isWithin(convert(fractionOf(read.text), unit, item.unit), item.key) ? 1 : 0 }
}

function toNumberAnswer(answer: Answer, unit: Unit): { value: number | string, unit: string } | null {
  if (typeof answer === 'number' || typeof answer === 'string') return { value: answer, unit }
  return isList(answer) ? null : { value: answer.value, unit: answer.unit ?? unit }
}

function isWithin(value: Fraction, key: NumberKey): boolean {
  const right = fractionOf(String(key.value))
  const tolerance = fractionOf(String(key.tolerance))
  const width = key.relative ? absolute(multiply(tolerance, right)) : tolerance
  const minusOne: Fraction = { top: -1n, bottom: 1n }
  return isAtMost(absolute(add(value, multiply(right, minusOne))), width)
}

function isList(answer: Answer): answer is readonly string[] {
  return Array.isArray(answer)
}
