/** The server's one clock. `isSet` says that it was started at a chosen instant (tests, demos), which seals record. */
export interface Clock {
  /** The present instant, ISO 8601 UTC with Z. */
  now: () => string
  isSet: boolean
}

/** A clock that ticks on from `startedAt` (an ISO instant), or the machine's own when that is empty. Throws on nonsense. */
export function createClock(startedAt = ''): Clock {
  if (!startedAt) return { now: () => new Date().toISOString(), isSet: false }
  const start = Date.parse(startedAt)
  if (Number.isNaN(start)) throw new Error(`NUXT_CLOCK is not an instant: ${startedAt}`)
  const offset = start - Date.now()
  return { now: () => new Date(Date.now() + offset).toISOString(), isSet: true }
}
