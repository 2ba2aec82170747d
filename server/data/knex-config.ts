import type { Knex } from 'knex'

/** Renames each name once: a list of rows has the same few names over and over. Columns and aliases are few, so this stays small. */
function once(rename: (name: string) => string): (name: string) => string {
  const known = new Map<string, string>()
  return (name) => {
    let renamed = known.get(name)
    if (renamed === undefined) known.set(name, renamed = rename(name))
    return renamed
  }
}
const toSnake = once(name => name.replace(/[A-Z]/g, letter => `_${letter.toLowerCase()}`))
const toCamel = once(name => name.replace(/_([a-z0-9])/g, (_, letter: string) => letter.toUpperCase()))

/** Column names are snake_case in SQL and camelCase in code; rows are renamed here and nowhere else. */
function camelRow(row: unknown): unknown {
  if (row === null || typeof row !== 'object' || Array.isArray(row) || Buffer.isBuffer(row)) return row
  const renamed: Record<string, unknown> = {}
  const raw = row as Record<string, unknown>
  for (const key in raw) renamed[toCamel(key)] = raw[key]
  return renamed
}

interface RawConnection { pragma: (source: string) => unknown }

/**
 * The one Knex configuration, for the server, the command line and the tests.
 * One connection: SQLite has one writer, and Lucia shares it (see `server/services/sessions.ts`).
 */
export function knexConfigFor(filename: string): Knex.Config {
  return {
    client: 'better-sqlite3',
    connection: { filename },
    useNullAsDefault: true,
    pool: {
      min: 1,
      max: 1,
      afterCreate(connection: RawConnection, done: (error: Error | null, connection: RawConnection) => void) {
        connection.pragma('journal_mode = WAL')
        connection.pragma('synchronous = FULL')
        connection.pragma('busy_timeout = 5000')
        connection.pragma('foreign_keys = ON')
        done(null, connection)
      },
    },
    acquireConnectionTimeout: 5000,
    // Knex also asks for the name of an unnamed primary key, which is undefined.
    wrapIdentifier: (name: string | undefined, original) => (!name || name === '*' ? original(name ?? '') : original(toSnake(name))),
    postProcessResponse: (result: unknown) => (Array.isArray(result) ? result.map(camelRow) : camelRow(result)),
  }
}

interface Responding { processResponse: (query: { pluck?: string }, runner: unknown) => unknown }
const renaming = new WeakSet<object>()

/**
 * Knex plucks from the raw row, before names are renamed: `pluck('siteId')` has to look for `site_id`. A transaction
 * has a client of its own, so this is done once to what all clients share.
 */
export function renamePlucked(db: Knex): void {
  const shared = Object.getPrototypeOf(db.client) as Responding
  if (renaming.has(shared)) return
  renaming.add(shared)
  const { processResponse } = shared
  shared.processResponse = function (query, runner) {
    if (query?.pluck) query.pluck = toSnake(query.pluck)
    return processResponse.call(this, query, runner)
  }
}
