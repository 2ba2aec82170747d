import type { BankItem, QuizBank } from '#shared/domain/quiz-bank'

const both = (text: string) => ({ en: text, es: `${text} (es)` })
const choices = (ids: readonly string[]) => ids.map(id => ({ id, text: both(`Option ${id}`) }))
const base = { lesson: 'first', mustKnow: false, source: 'common practice', stem: both('Stem'), feedback: both('Feedback') }

type Changes = Partial<Pick<BankItem, 'id' | 'lesson' | 'mustKnow' | 'picture'>>

/** An item with options a to d of which b is right. */
export function aOne(changes: Changes = {}): BankItem {
  return { ...base, id: 'one', kind: 'one', options: choices(['a', 'b', 'c', 'd']), key: 'b', ...changes }
}

/** A place item with letters a to e of which d is right. */
export function aPlace(changes: Changes = {}): BankItem {
  return { ...base, id: 'place', kind: 'place', picture: 'quiz-corner', options: choices(['a', 'b', 'c', 'd', 'e']), key: 'd', ...changes }
}

/** An item with options a to e of which a, c and d are right. */
export function anAll(changes: Changes = {}): BankItem {
  return { ...base, id: 'all', kind: 'all', options: choices(['a', 'b', 'c', 'd', 'e']), key: ['a', 'c', 'd'], ...changes }
}

/** Five steps whose right order is c, a, d, b, e. */
export function anOrder(changes: Changes = {}): BankItem {
  return { ...base, id: 'order', kind: 'order', options: choices(['a', 'b', 'c', 'd', 'e']), key: ['c', 'a', 'd', 'b', 'e'], ...changes }
}

/** A length of 11.25 in, within 0.3 in, that may be answered in inches or millimetres. */
export function aNumber(changes: Changes & Partial<Pick<Extract<BankItem, { kind: 'number' }>, 'unit' | 'units' | 'key'>> = {}): BankItem {
  return { ...base, id: 'number', kind: 'number', unit: 'in', units: ['in', 'mm'], key: { value: 11.25, tolerance: 0.3 }, ...changes }
}

/** A bank of 24 items over four lessons, the first five of them must-know, ten to an attempt. */
export function aBank(changes: Partial<QuizBank> = {}): QuizBank {
  const makers = [aOne, anAll, anOrder, aNumber, aPlace]
  const items = Array.from({ length: 24 }, (_, index) => (makers[index % makers.length] ?? aOne)({
    id: `item-${String(index + 1).padStart(2, '0')}`, lesson: `lesson-${index % 4}`, mustKnow: index < 5,
  }))
  return { module: 'stacking', quizLength: 10, passMark: 0.8, pauseMinutes: 20, items, ...changes }
}
