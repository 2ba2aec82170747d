import type { ItemGrade } from '#shared/domain/grading'
import type { Answer, BankItem } from '#shared/domain/quiz-bank'
import type { AttemptResultView } from '#shared/schemas/learning'
import { Refusal } from './refusal'

type Right = NonNullable<AttemptResultView['items'][number]['right']>

/** True when something was picked or typed; an empty pick or field is no answer. */
export function isAnswered(answer: unknown): boolean {
  if (answer === null || answer === undefined) return false
  if (typeof answer === 'string') return answer.trim() !== ''
  return !Array.isArray(answer) || answer.length > 0
}

/** The right answer, to be named after grading. */
export function rightOf(item: BankItem): Right {
  if (item.kind === 'number') return { value: item.key.value, unit: item.unit }
  return typeof item.key === 'string' ? item.key : [...item.key]
}

function isOfKind(item: BankItem, answer: Answer): boolean {
  if (item.kind === 'one' || item.kind === 'place') return typeof answer === 'string'
  if (item.kind === 'all' || item.kind === 'order') return Array.isArray(answer)
  return !Array.isArray(answer)
}

/**
 * Refuses answers that could not be meant so, before anything is graded: 400 where an answer is of another kind than
 * its item, 422 where a number can be read in two ways or is in a unit that was not offered. A slip of the
 * keyboard must not cost an attempt.
 */
export function refuseUnreadable(items: readonly BankItem[], answers: ReadonlyMap<string, Answer>, grades: readonly ItemGrade[]): void {
  const ofOtherKind = items.filter(item => answers.has(item.id) && !isOfKind(item, answers.get(item.id)!)).map(item => item.id)
  const noNumber = grades.filter(grade => grade.unread === 'notANumber').map(grade => grade.id)
  const malformed = [...new Set([...ofOtherKind, ...noNumber])]
  const toFields = (entries: [string, string][]) => Object.fromEntries(entries.map(([id, why]) => [`answers.${id}`, why]))
  if (malformed.length > 0) {
    throw new Refusal('malformed', 'invalid', { message: 'Some answers are of the wrong kind', fields: toFields(malformed.map(id => [id, noNumber.includes(id) ? 'must be a number' : 'is of another kind than its item'])) })
  }
  const unread = grades.filter(grade => grade.unread === 'ambiguous' || grade.unread === 'wrongUnit')
  if (unread.length === 0) return
  throw new Refusal('unprocessable', unread.some(grade => grade.unread === 'ambiguous') ? 'ambiguousNumber' : 'wrongUnit', {
    message: 'Some numbers can\'t be read',
    fields: toFields(unread.map(grade => [grade.id, grade.unread === 'ambiguous' ? 'can be read in two ways: leave out the thousands mark' : 'is in a unit that was not offered'])),
  })
}
