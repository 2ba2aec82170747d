import type { Actor } from '#shared/access/abilities'
import type { Db } from '~~/server/data/database'
import type { Settings } from '~~/server/services/settings'

declare module 'h3' {
  interface H3EventContext {
    db: Db
    settings: Settings
    /** The signed-in person, or null. */
    actor: Actor | null
    /** Replaces a route's usual status: a repeat of something that was made answers 200 instead of 201. */
    answerStatus?: 200
  }
}

export {}
