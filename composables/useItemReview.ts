import { LEAST_SERVINGS } from '#shared/domain/item-review'
import { takenIns, type ItemReviewLine, type ItemReviewView, type TakenIn } from '#shared/schemas/item-review'

type SortKey = 'stem' | 'served' | 'p' | 'itemRest' | 'flags'

/** What a column is sorted by: those to look at weigh more the more reasons they have. */
const weights: Record<SortKey, (line: ItemReviewLine) => number | string> = {
  stem: line => line.id,
  served: line => line.served,
  p: line => (line.served === 0 ? 2 : line.p),
  itemRest: line => line.itemRest ?? 2,
  flags: line => (line.struck ? -1 : line.flags.length),
}

/** The lines in the order of `sort` (a column, a minus in front for downwards), then by their number. */
export function sortLines(lines: readonly ItemReviewLine[], sort: string): ItemReviewLine[] {
  const weight = weights[sort.replace(/^-/, '') as SortKey] ?? weights.flags
  const sign = sort.startsWith('-') ? -1 : 1
  const compare = <Value extends number | string>(first: Value, second: Value) => (first < second ? -1 : first > second ? 1 : 0)
  return [...lines].sort((first, second) => sign * compare(weight(first), weight(second)) || compare(first.id, second.id))
}

/** The headline's words: what the review answers. */
export function headlineOf({ items, attempts }: Pick<ItemReviewView, 'items' | 'attempts'>) {
  const asked = items.filter(line => !line.struck)
  const flagged = asked.filter(line => line.flags.length > 0).length
  const judged = asked.filter(line => line.served >= LEAST_SERVINGS).length
  if (attempts === 0) return { key: 'headlineNobody', n: 0, total: asked.length } as const
  if (asked.length === 0) return { key: 'headlineStruckAll', n: 0, total: 0 } as const
  if (judged === 0) return { key: 'headlineTooFew', n: 0, total: asked.length } as const
  return flagged > 0 ? { key: 'headline', n: flagged, total: asked.length } as const : { key: 'headlineNone', n: judged, total: asked.length } as const
}

/** Whose attempts an address asks for; all where it says nothing that is known. */
export const toTakenIn = (value: unknown): TakenIn => takenIns.find(one => one === value) ?? 'all'

/** A share as whole percent: never 100 below all, never 0 above none. */
export function toPercent(share: number): number {
  const rounded = Math.round(share * 100)
  return rounded === 100 && share < 1 ? 99 : rounded === 0 && share > 0 ? 1 : rounded
}

/** A correlation or alpha with two digits and a real minus. */
export const toFigure = (value: number) => value.toFixed(2).replace(/^-0\.00$/, '0.00').replace('-', '−')
