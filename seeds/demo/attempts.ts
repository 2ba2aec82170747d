import { addMinutes, type Instant } from '../../shared/domain/dates'
import { drawAttempt } from '../../shared/domain/drawing-of-items'
import { attemptResult } from '../../shared/domain/grading'
import type { Answer, BankItem, QuizBank } from '../../shared/domain/quiz-bank'
import { personId } from './people'
import { createRandom, demoId, type Random } from './random'
import type { DemoPerson } from './roster'

/** A past go at a quiz that is to be told. */
export interface ToldAttempt { person: DemoPerson, bank: QuizBank, startedAt: Instant, isToPass: boolean }

const rightAnswer = (item: BankItem): Answer => (item.kind === 'number' ? item.key.value : typeof item.key === 'string' ? item.key : [...item.key])

function wrongAnswer(item: BankItem): Answer {
  if (item.kind === 'number') return item.key.value * 2 + 1
  if (item.kind === 'order') return [...item.key].reverse()
  const other = item.options.find(option => !item.key.includes(option.id))?.id ?? ''
  return item.kind === 'all' ? [other] : other
}

/** Wrong on a few: never on what must be known when the attempt is to pass, and on that first when it is not. */
function pickMissed(items: readonly BankItem[], isToPass: boolean, random: Random): Set<string> {
  const must = items.filter(item => item.mustKnow).map(item => item.id)
  const rest = items.filter(item => !item.mustKnow).map(item => item.id)
  const missed = Array.from({ length: isToPass ? random.between(0, 1) : 2 }, () => random.pick(rest))
  return new Set(isToPass ? missed : [...missed, random.pick(must)])
}

/** The row of a graded attempt, drawn and graded by the product's own rules. Throws when it came out otherwise than told. */
export function attemptRow({ person, bank, startedAt, isToPass }: ToldAttempt) {
  const id = demoId(`attempt ${person.badge} ${bank.module} ${startedAt}`)
  const random = createRandom(id)
  const served = drawAttempt(bank, id).flatMap(({ id: itemId, options }) => {
    const item = bank.items.find(one => one.id === itemId)
    return item ? [{ item, options }] : []
  })
  const items = served.map(one => one.item)
  const missed = pickMissed(items, isToPass, random)
  const answers = new Map(items.map(item => [item.id, missed.has(item.id) ? wrongAnswer(item) : rightAnswer(item)]))
  const result = attemptResult({ items, answers, passMark: bank.passMark })
  if (result.passed !== isToPass) throw new Error(`The demo attempt of ${person.key} at ${bank.module} did not come out as told`)
  return {
    id, personId: personId(person), module: bank.module, language: person.language, seed: id, served: JSON.stringify({ passMark: bank.passMark, items: served }),
    startedAt, endsAt: addMinutes(startedAt, 60), submittedAt: addMinutes(startedAt, random.between(8, 19)),
    answers: JSON.stringify(Object.fromEntries(answers)), result: JSON.stringify({ ...result, credentialId: null }), score: result.score, passed: result.passed,
  }
}
