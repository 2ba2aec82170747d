/** Whole numbers below a bound, always the same ones for a seed (Park and Miller's generator with 48271). */
export function randomFrom(seed: number): (below: number) => number {
  let state = seed
  return below => (state = state * 48271 % 2147483647) % below
}
