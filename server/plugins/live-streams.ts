import { endAllStreams } from '../services/briefing-events'

/** Lets the server stop at once although live screens are open. */
export default defineNitroPlugin(() => {
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, endAllStreams)
})
