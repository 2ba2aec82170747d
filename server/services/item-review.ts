import { moduleBySlug } from '#shared/domain/curriculum'
import { reviewItems, type QuizFigures } from '#shared/domain/item-review'
import type { Answer, BankItem } from '#shared/domain/quiz-bank'
import { listModuleAttempts } from '../data/attempts'
import { notFound } from './refusal'
import type { Teaching } from './teaching'
import type { Work } from './work'

function wrongPicks(item: BankItem, answer: Answer | undefined): string[] {
  if (item.kind === 'number' || item.kind === 'order' || answer === undefined) return []
  const right: readonly string[] = typeof item.key === 'string' ? [item.key] : item.key
  const picked = typeof answer === 'string' ? [answer] : Array.isArray(answer) ? answer as readonly string[] : []
  return item.options.map(option => option.id).filter(id => picked.includes(id) && !right.includes(id))
}

/** How a module's items did over every graded attempt, without names. 404 for no such module; a module without a quiz has no items. */
export async function reviewModuleItems(work: Work, teaching: Teaching, slug: string): Promise<QuizFigures> {
  if (!moduleBySlug(slug)) throw notFound('module')
  const attempts = await listModuleAttempts(work.db, slug)
  return reviewItems(teaching.get(slug)?.bank.items.map(item => item.id) ?? [], attempts.map(({ personId, served, result, answers }) => {
    const items = new Map(served.items.map(({ item }) => [item.id, item]))
    return {
      personId,
      items: (result?.items ?? []).flatMap(({ id, share }) => {
        const item = items.get(id)
        return item ? [{ id, share, wrongPicks: wrongPicks(item, answers?.[id]) }] : []
      }),
    }
  }))
}
