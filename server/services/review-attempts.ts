import type { ReviewedAttempt } from '#shared/domain/item-review'
import type { Answer, BankItem } from '#shared/domain/quiz-bank'
import type { TakenIn } from '#shared/schemas/item-review'
import { listModuleAttempts, type Attempt } from '../data/attempts'
import type { Work } from './work'

/** Ids of the right options; none for a number. */
export const keyOf = (item: BankItem): readonly string[] => (item.kind === 'number' ? [] : typeof item.key === 'string' ? [item.key] : item.key)
/** True for the kinds that are answered by picking options. */
export const hasPicks = (item: BankItem) => item.kind === 'one' || item.kind === 'all' || item.kind === 'place'

/** The options that an answer picked; none for an order or a number. */
function picksOf(item: BankItem, answer: Answer | undefined): string[] {
  if (item.kind === 'number' || item.kind === 'order') return []
  const picked = typeof answer === 'string' ? [answer] : Array.isArray(answer) ? answer as readonly string[] : []
  return item.options.map(option => option.id).filter(id => picked.includes(id))
}

/** An attempt shown in both languages tells of neither, so it counts only among all. */
const isTakenIn = (attempt: Attempt, takenIn: TakenIn) => takenIn === 'all' || attempt.languages.every(language => language === takenIn)

/** An attempt as the figures need it; what was wrong is judged by the key that was served. */
export function toReviewed({ personId, served, result, answers }: Attempt): ReviewedAttempt {
  const items = new Map(served.items.map(({ item }) => [item.id, item]))
  return {
    personId,
    items: (result?.items ?? []).flatMap(({ id, share }) => {
      const item = items.get(id)
      return item ? [{ id, share, wrongPicks: picksOf(item, answers?.[id]).filter(pick => !keyOf(item).includes(pick)) }] : []
    }),
  }
}

/** The graded attempts at a module that are looked at. */
export async function loadAttempts(work: Work, slug: string, takenIn: TakenIn): Promise<Attempt[]> {
  return (await listModuleAttempts(work.db, slug)).filter(attempt => isTakenIn(attempt, takenIn))
}

/** An item's options with how often each was picked; none where nothing is picked. */
export function optionsOf(item: BankItem, attempts: readonly Attempt[]) {
  if (item.kind === 'number' || !hasPicks(item)) return []
  const counts = new Map<string, number>()
  for (const { served, answers } of attempts) {
    const shown = served.items.find(one => one.item.id === item.id)?.item
    if (shown) for (const pick of picksOf(shown, answers?.[item.id])) counts.set(pick, (counts.get(pick) ?? 0) + 1)
  }
  return item.options.map(({ id, text }) => ({ id, text, picks: counts.get(id) ?? 0, isRight: keyOf(item).includes(id) }))
}
