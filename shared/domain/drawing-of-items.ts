import type { BankItem, QuizBank } from './quiz-bank'
import { numbersFrom, shuffled, type NextNumber } from './seeded-numbers'

/** One item of an attempt, with the order in which its options are shown. */
export interface DrawnItem {
  id: string
  /** Option ids in the order shown; empty for a number. */
  options: string[]
}

/**
 * Draws an attempt from a bank: the same bank, struck list and seed give the same attempt for ever. Must-know
 * items are always in, also when there are more of them than the quiz length; the rest is spread over the
 * lessons, the lesson with fewest items so far first. Struck items are left out. Items and options are shuffled;
 * the letters of a place item keep the order of its picture, and an order item is never shown already in order.
 */
export function drawAttempt(bank: QuizBank, seed: string, struck: ReadonlySet<string> = new Set()): DrawnItem[] {
  const next = numbersFrom(seed)
  const usable = shuffled([...bank.items].filter(item => !struck.has(item.id)).sort(byId), next)
  const drawn = usable.filter(item => item.mustKnow)
  const rest = usable.filter(item => !item.mustKnow)
  while (drawn.length < bank.quizLength && rest.length > 0) {
    const [item] = rest.splice(indexOfLeastCovered(rest, drawn), 1)
    if (item) drawn.push(item)
  }
  return shuffled(drawn, next).map(item => ({ id: item.id, options: optionOrder(item, next) }))
}

/** The first of the remaining items whose lesson has the fewest items drawn so far. */
function indexOfLeastCovered(rest: readonly BankItem[], drawn: readonly BankItem[]): number {
  const counts = rest.map(item => drawn.filter(other => other.lesson === item.lesson).length)
  return counts.indexOf(Math.min(...counts))
}

function optionOrder(item: BankItem, next: NextNumber): string[] {
  if (item.kind === 'number') return []
  const ids = item.options.map(option => option.id)
  if (item.kind === 'place') return ids
  const order = shuffled(ids, next)
  const isSolved = item.kind === 'order' && order.every((id, index) => id === item.key[index])
  return isSolved ? [...order.slice(1), ...order.slice(0, 1)] : order
}

function byId(first: BankItem, second: BankItem): number {
  return first.id < second.id ? -1 : first.id > second.id ? 1 : 0
}
