/** Gives the next number of its sequence: a whole number from 0 up to, not including, `below`. */
export type NextNumber = (below: number) => number

const TWO_TO_32 = 2 ** 32

/**
 * A sequence of numbers from a text seed, the same on every machine. The seed is hashed with 32-bit FNV-1a over
 * its UTF-16 units into the start of a mulberry32 generator (both in the public domain); a draw that would favour
 * small numbers is thrown away. For shuffling quizzes only: not a source of secrets.
 */
export function numbersFrom(seed: string): NextNumber {
  let state = hashOf(seed)

  function draw(): number {
    state = (state + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return (mixed ^ (mixed >>> 14)) >>> 0
  }

  return (below) => {
    if (!Number.isInteger(below) || below < 1 || below > TWO_TO_32) throw new RangeError(`Not a whole number from 1 to 2^32: ${below}`)
    const fair = TWO_TO_32 - (TWO_TO_32 % below)
    let drawn = draw()
    while (drawn >= fair) drawn = draw()
    return drawn % below
  }
}

/** A shuffled copy (Fisher and Yates): every order is equally likely. */
export function shuffled<T>(list: readonly T[], next: NextNumber): T[] {
  const pool = [...list]
  const result: T[] = []
  while (pool.length > 0) result.push(...pool.splice(next(pool.length), 1))
  return result
}

function hashOf(text: string): number {
  let hash = 0x811C9DC5
  for (let index = 0; index < text.length; index += 1) hash = Math.imul(hash ^ text.charCodeAt(index), 0x01000193) >>> 0
  return hash
}
