import { reviewItems } from '#shared/domain/item-review'
import type { Answer, BankItem } from '#shared/domain/quiz-bank'
import type { Language } from '#shared/domain/states'
import type { ItemDetailView, TakenIn } from '#shared/schemas/item-review'
import type { Attempt } from '../data/attempts'
import { listStrikes, listStruckIds } from '../data/struck-items'
import { isAnswered } from './answers'
import { requireItem, requireModule } from './bank-items'
import { refuseWithheld, toLine } from './item-review'
import { hasPicks, loadAttempts, optionsOf, toReviewed } from './review-attempts'
import type { Teaching } from './teaching'
import type { Work } from './work'

/** Answers to an order or number item as they were given, in letters or numbers, most often first. */
function givenAnswers(item: BankItem, attempts: readonly Attempt[]): ItemDetailView['given'] {
  if (hasPicks(item)) return []
  const counts = new Map<string, { answer: string, count: number, isRight: boolean }>()
  for (const { answers, result } of attempts) {
    const answer = answers?.[item.id]
    if (answer === undefined || !isAnswered(answer)) continue
    const words = toWords(item, answer)
    const known = counts.get(words)
    counts.set(words, { answer: words, count: (known?.count ?? 0) + 1, isRight: result?.items.find(grade => grade.id === item.id)?.share === 1 })
  }
  return [...counts.values()].sort((first, second) => second.count - first.count || (first.answer < second.answer ? -1 : 1)).slice(0, 10)
}

function toWords(item: BankItem, answer: Answer): string {
  if (Array.isArray(answer)) return (answer as readonly string[]).join(' ')
  const { value, unit } = typeof answer === 'object' ? answer as { value: number | string, unit?: string } : { value: answer, unit: undefined }
  return `${value} ${unit ?? (item.kind === 'number' ? item.unit : '')}`.trim()
}

function rightWords(item: BankItem): string | null {
  if (item.kind === 'number') return `${item.key.value} ${item.unit}`
  return item.kind === 'order' ? item.key.join(' ') : null
}

/**
 * One item with its texts in both languages, its key, what was picked and its strikes. 404 for no such item; 409
 * `ownAttemptRuns` while the reader has an unsent attempt at that quiz.
 */
export async function readItem(work: Work, teaching: Teaching, { itemId, takenIn, language }: { itemId: string, takenIn: TakenIn, language: Language }): Promise<ItemDetailView> {
  const { taught, item } = requireItem(teaching, itemId)
  const { slug } = taught
  await refuseWithheld(work, slug)
  const attempts = await loadAttempts(work, slug, takenIn)
  const [figures] = reviewItems([itemId], attempts.map(toReviewed), await listStruckIds(work.db, slug)).items
  const strikes = (await listStrikes(work.db, itemId)).map(strike => ({
    reason: strike.reason, by: strike.striker, at: strike.struckAt,
    restored: strike.restoredAt ? { reason: strike.restoreReason ?? '', by: strike.restorer ?? '', at: strike.restoredAt } : null,
  }))
  const options = item.kind === 'order' ? item.options.map(one => ({ ...one, picks: 0, isRight: false })) : optionsOf(item, attempts)
  return {
    ...toLine({ taught, item, figures: figures!, language }), module: { slug, title: requireModule(slug).title[language] }, takenIn,
    stem: item.stem, feedback: item.feedback, source: item.source, ...(item.picture && { picture: item.picture }),
    options, right: rightWords(item), given: givenAnswers(item, attempts), isStruck: strikes.some(strike => !strike.restored), strikes,
  }
}
