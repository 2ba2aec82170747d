/** One graded attempt, as far as the review of items needs it. */
export interface ReviewedAttempt {
  personId: string
  items: readonly {
    id: string
    /** Share right, 0 to 1. */
    share: number
    /** Ids of wrong options that were picked. */
    wrongPicks: readonly string[]
  }[]
}

/** Why an item should be looked at. */
export const itemFlags = ['tooEasy', 'tooHard', 'doesNotSeparate', 'keyMayBeWrong'] as const
/** One reason to look at an item. */
export type ItemFlag = (typeof itemFlags)[number]

/** How one item did. */
export interface ItemFigures {
  id: string
  served: number
  /** Mean share right. */
  p: number
  /** Corrected item-rest correlation; null where either side does not vary. */
  itemRest: number | null
  /** How often each wrong option was picked. */
  picks: Record<string, number>
  flags: ItemFlag[]
}

/** How a module's quiz did. `alpha` is null where it can't be told. */
export interface QuizFigures {
  people: number
  alpha: number | null
  items: ItemFigures[]
}

/** Below this many servings nothing is flagged: chance would speak. */
export const LEAST_SERVINGS = 30
/** Usual limits of classical item analysis (common practice). */
const TOO_EASY = 0.95
const TOO_HARD = 0.3
const LEAST_ITEM_REST = 0.15

const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length

function covariance(left: readonly number[], right: readonly number[]): number {
  const [leftMean, rightMean] = [mean(left), mean(right)]
  return left.reduce((sum, value, index) => sum + (value - leftMean) * ((right[index] ?? 0) - rightMean), 0) / (left.length - 1)
}

/** Pearson's correlation, for a right-or-wrong item the point-biserial; null with fewer than two pairs or where a side does not vary. */
export function correlation(left: readonly number[], right: readonly number[]): number | null {
  if (left.length < 2) return null
  const [leftSpread, rightSpread] = [covariance(left, left), covariance(right, right)]
  const isFlat = leftSpread < 1e-12 || rightSpread < 1e-12
  return isFlat ? null : covariance(left, right) / Math.sqrt(leftSpread * rightSpread)
}

/**
 * Cronbach's alpha (KR-20 when every share is 0 or 1) from the mean variance of an item and the mean covariance of a
 * pair, each over the attempts that were served both, so that attempts with different items count too; with
 * the same items in every attempt it is the textbook figure. The length is the mean number of items in an attempt.
 * Null where it can't be told: nothing varies, or the pairs are too few to fit together (their variance comes out
 * negative).
 */
export function alphaOf(attempts: readonly ReviewedAttempt[]): number | null {
  const shares = new Map<string, Map<number, number>>()
  attempts.forEach((attempt, index) => attempt.items.forEach(({ id, share }) => shares.set(id, (shares.get(id) ?? new Map<number, number>()).set(index, share))))
  const columns = [...shares.values()]
  const variances: number[] = []
  const covariances: number[] = []
  columns.forEach((left, at) => {
    if (left.size > 1) variances.push(covariance([...left.values()], [...left.values()]))
    for (const right of columns.slice(at + 1)) {
      const both = [...left.keys()].filter(index => right.has(index))
      if (both.length > 1) covariances.push(covariance(both.map(index => left.get(index) ?? 0), both.map(index => right.get(index) ?? 0)))
    }
  })
  if (variances.length === 0 || covariances.length === 0) return null
  const length = mean(attempts.map(attempt => attempt.items.length))
  const [variance, shared] = [mean(variances), mean(covariances)]
  const spread = variance + (length - 1) * shared
  return spread < 1e-12 ? null : length * shared / spread
}

function flagsOf({ served, p, itemRest }: Pick<ItemFigures, 'served' | 'p' | 'itemRest'>): ItemFlag[] {
  if (served < LEAST_SERVINGS) return []
  const flags: ItemFlag[] = []
  if (p > TOO_EASY) flags.push('tooEasy')
  if (p < TOO_HARD) flags.push('tooHard')
  if (itemRest !== null && itemRest < 0) flags.push('keyMayBeWrong')
  else if (itemRest !== null && itemRest < LEAST_ITEM_REST) flags.push('doesNotSeparate')
  return flags
}

/**
 * The figures of a module's items over its graded attempts; `ids` are the items to report, served or not. Struck items
 * are reported too, but count neither in `alpha` nor in the rest that another item is held against: the figures are
 * those of the quiz as it is drawn from now on.
 */
export function reviewItems(ids: readonly string[], attempts: readonly ReviewedAttempt[], struck: ReadonlySet<string> = new Set()): QuizFigures {
  const items = ids.map((id) => {
    const seen = attempts.flatMap((attempt) => {
      const own = attempt.items.find(item => item.id === id)
      const rest = attempt.items.filter(item => item.id !== id && !struck.has(item.id))
      return own ? [{ own, rest: rest.length === 0 ? 0 : mean(rest.map(item => item.share)) }] : []
    })
    const picks: Record<string, number> = {}
    for (const { own } of seen) for (const pick of own.wrongPicks) picks[pick] = (picks[pick] ?? 0) + 1
    const figures = {
      served: seen.length, p: seen.length === 0 ? 0 : mean(seen.map(({ own }) => own.share)),
      itemRest: correlation(seen.map(({ own }) => own.share), seen.map(({ rest }) => rest)),
    }
    return { id, ...figures, picks, flags: flagsOf(figures) }
  })
  return { people: new Set(attempts.map(attempt => attempt.personId)).size, alpha: alphaOf(struck.size === 0 ? attempts : attempts.map(attempt => ({ ...attempt, items: attempt.items.filter(item => !struck.has(item.id)) }))), items }
}
