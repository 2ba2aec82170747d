/** What happens at a briefing while its live screen is open. */
export interface BriefingEvent {
  kind: 'signIn' | 'closed' | 'sealed'
  data: Record<string, unknown>
}
type Listener = (event: BriefingEvent) => void

/** One process holds one company's live screens; who listens elsewhere polls. */
const listeners = new Map<string, Set<Listener>>()

/** Tells every open live screen of a briefing. Call it after the transaction, so that nobody hears of what was rolled back. */
export function tellBriefing(briefingId: string, event: BriefingEvent): void {
  for (const listener of listeners.get(briefingId) ?? []) listener(event)
}

/** Listens to a briefing; the answer stops it. */
export function listenToBriefing(briefingId: string, listener: Listener): () => void {
  const set = listeners.get(briefingId) ?? new Set<Listener>()
  listeners.set(briefingId, set.add(listener))
  return () => {
    set.delete(listener)
    if (set.size === 0) listeners.delete(briefingId)
  }
}

/** What ends each open stream: a server that is told to stop would otherwise wait for the last live screen. */
const openStreams = new Set<() => void>()

/** Remembers how to end a stream; the answer forgets it. */
export function holdStream(end: () => void): () => void {
  openStreams.add(end)
  return () => openStreams.delete(end)
}

/** Ends every open stream; the screens connect again by themselves, or ask every few seconds. */
export function endAllStreams(): void {
  for (const end of openStreams) end()
}
