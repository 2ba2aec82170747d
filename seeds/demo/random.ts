import { createHash } from 'node:crypto'

/** A repeatable stream of choices: the same name gives the same choices at every seeding. */
export interface Random {
  /** A whole number from `least` to `most`, both included. */
  between: (least: number, most: number) => number
  /** One of the list, which may not be empty. */
  pick: <Item>(list: readonly Item[]) => Item
  /** True in about `share` of the calls, 0 to 1. */
  chance: (share: number) => boolean
}

/** A stream of its own for each part of the seed, so that a change in one part leaves the others as they were. */
export function createRandom(name: string): Random {
  let state = createHash('sha256').update(name).digest().readUInt32LE(0)
  // Mulberry32 (public domain): small, and good enough to scatter dates.
  const next = () => {
    state = (state + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296
  }
  const between = (least: number, most: number) => least + Math.floor(next() * (most - least + 1))
  return {
    between,
    pick: (list) => {
      const item = list[between(0, list.length - 1)]
      if (item === undefined) throw new RangeError('Nothing to pick from')
      return item
    },
    chance: share => next() < share,
  }
}

/** The same UUID-shaped id for the same thing at every seeding. */
export function demoId(thing: string): string {
  const hex = createHash('sha256').update(`Cedar Hollow Walls ${thing}`).digest('hex')
  const variant = '89ab'[Number.parseInt(hex.charAt(16), 16) & 3]
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-4${hex.slice(13, 16)}-${variant}${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}
