/** The 97.5 % point of the normal distribution: two-sided 95 %. */
const NORMAL_95 = 1.959963984540054

/** A range in which a share lies; both ends from 0 to 1. */
export interface ShareRange {
  low: number
  high: number
}

/**
 * The 95 % score interval of a share right (E. B. Wilson, 1927), or null where nothing was served. For an item with
 * part marks the mean share stands in for right over served: such marks vary less than right-or-wrong ones, so the
 * interval is then rather too wide than too narrow.
 */
export function wilsonInterval(share: number, served: number): ShareRange | null {
  if (served <= 0) return null
  const square = NORMAL_95 ** 2 / served
  const middle = share + square / 2
  const reach = Math.sqrt(square * (share * (1 - share) + square / 4))
  return { low: Math.max(0, (middle - reach) / (1 + square)), high: Math.min(1, (middle + reach) / (1 + square)) }
}

/** How many attempts scored in one tenth of the scale. */
export interface ScoreBand {
  /** From this many percent (included) … */
  from: number
  /** … to this many (excluded); the last band holds 100 too. */
  to: number
  attempts: number
  passed: number
}

/** Attempts by their score in ten bands of 10 %; every band is there, empty or not. */
export function scoreBands(attempts: readonly { score: number, passed: boolean }[]): ScoreBand[] {
  const bands = Array.from({ length: 10 }, (_, index): ScoreBand => ({ from: index * 10, to: index * 10 + 10, attempts: 0, passed: 0 }))
  for (const { score, passed } of attempts) {
    const band = bands[Math.min(9, Math.floor(score * 10 + 1e-9))]
    if (!band) continue
    band.attempts++
    if (passed) band.passed++
  }
  return bands
}

/** What an alpha is worth, in a word. */
export const reliabilities = ['unknown', 'tooFew', 'low', 'fair', 'good'] as const
/** One word for an alpha. */
export type Reliability = (typeof reliabilities)[number]

/** Fewer attempts than this say too little about a quiz as a whole. */
export const LEAST_ATTEMPTS = 30

/** The word for an alpha: good from 0.8, fair from 0.7 (usual limits, common practice); no word below 30 attempts. */
export function reliabilityOf(alpha: number | null, attempts: number): Reliability {
  if (alpha === null) return 'unknown'
  if (attempts < LEAST_ATTEMPTS) return 'tooFew'
  return alpha >= 0.8 ? 'good' : alpha >= 0.7 ? 'fair' : 'low'
}
