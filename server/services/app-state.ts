import type { Db } from '../data/database'
import type { Settings } from './settings'

/**
 * The open database and settings for work that no request starts (scheduled tasks, the closing of a day).
 * Requests take theirs from the event's context.
 */
export const appState: { db: Db | null, settings: Settings | null } = { db: null, settings: null }

/** The open database and settings; null while the server is still starting. */
export function readyState(): { db: Db, settings: Settings } | null {
  return appState.db && appState.settings ? { db: appState.db, settings: appState.settings } : null
}
