import { BetterSqlite3Adapter } from '@lucia-auth/adapter-sqlite'
import { Lucia, TimeSpan, type DatabaseSession, type DatabaseUser } from 'lucia'
import type { Actor } from '#shared/access/abilities'
import type { Role } from '#shared/domain/states'
import type { Db } from '../data/database'
import type { Settings } from './settings'
import { sha256 } from './hashing'

/*
 * Everything about sessions stands in this file: Lucia is no longer developed, and replacing it means rewriting
 * these functions and nothing else.
 */

type RawDatabase = ConstructorParameters<typeof BetterSqlite3Adapter>[0]

const idleDays = 14
const longestDays = 60

/**
 * Lucia's adapter with two mends. It borrows the pool's one connection around each call (on the shared raw
 * connection a session made during somebody's transaction would be lost with its rollback), and it stores the
 * SHA-256 of a session's id, so that a stolen database opens no session.
 */
class PooledAdapter extends BetterSqlite3Adapter {
  readonly #db: Db
  readonly #shared: { connection: RawDatabase | null }

  constructor(db: Db) {
    const shared: { connection: RawDatabase | null } = { connection: null }
    const borrowed = { prepare: (sql: string) => shared.connection!.prepare(sql) } as unknown as RawDatabase
    super(borrowed, { user: 'people', session: 'sessions' })
    this.#db = db
    this.#shared = shared
  }

  async #borrow<Answer>(run: () => Promise<Answer>): Promise<Answer> {
    const connection = await this.#db.client.acquireConnection()
    this.#shared.connection = connection
    try {
      return await run()
    }
    finally {
      this.#shared.connection = null
      await this.#db.client.releaseConnection(connection)
    }
  }

  override async setSession(session: DatabaseSession) {
    return this.#borrow(() => super.setSession({ ...session, id: sha256(session.id) }))
  }

  override async deleteSession(id: string) {
    return this.#borrow(() => super.deleteSession(sha256(id)))
  }

  override async deleteUserSessions(userId: string) {
    return this.#borrow(() => super.deleteUserSessions(userId))
  }

  override async getUserSessions(userId: string) {
    return this.#borrow(() => super.getUserSessions(userId))
  }

  override async updateSessionExpiration(id: string, at: Date) {
    return this.#borrow(() => super.updateSessionExpiration(sha256(id), at))
  }

  override async deleteExpiredSessions() {
    return this.#borrow(() => super.deleteExpiredSessions())
  }

  override async getSessionAndUser(id: string): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    return this.#borrow(async () => {
      const [session, user] = await super.getSessionAndUser(sha256(id))
      return [session && { ...session, id }, user]
    })
  }
}

function luciaFor(db: Db, hasTls: boolean) {
  return new Lucia(new PooledAdapter(db), {
    sessionExpiresIn: new TimeSpan(idleDays, 'd'),
    sessionCookie: { name: 'session', attributes: { secure: hasTls, sameSite: 'lax', path: '/' } },
    getSessionAttributes: ({ via, created_at }) => ({ via, createdAt: created_at }),
    getUserAttributes: ({ name, role, language, hired_on, left_on }) => ({ name, role, language, hiredOn: hired_on, leftOn: left_on }),
  })
}

declare module 'lucia' {
  interface Register {
    Lucia: ReturnType<typeof luciaFor>
    DatabaseSessionAttributes: { via: 'password' | 'badge', created_at: number }
    DatabaseUserAttributes: { name: string, role: Role, language: 'en' | 'es', hired_on: string, left_on: string | null }
  }
}

const luciaByDatabase = new WeakMap<Db, ReturnType<typeof luciaFor>>()

function lucia(db: Db, settings: Settings) {
  let made = luciaByDatabase.get(db)
  if (!made) luciaByDatabase.set(db, made = luciaFor(db, settings.hasTls))
  return made
}

/** Makes a session and answers its `Set-Cookie` value. Never call it inside a transaction. */
export async function startSession(db: Db, settings: Settings, personId: string, via: 'password' | 'badge'): Promise<string> {
  const made = lucia(db, settings)
  const session = await made.createSession(personId, { via, created_at: Math.floor(Date.now() / 1000) })
  return made.createSessionCookie(session.id).serialize()
}

/** The actor behind a `Cookie` header, or null; `cookie` is a new `Set-Cookie` value when the session was prolonged or is over. */
export async function readSession(db: Db, settings: Settings, cookieHeader: string, today: string): Promise<{ actor: Actor | null, cookie?: string }> {
  const made = lucia(db, settings)
  const id = made.readSessionCookie(cookieHeader)
  if (!id) return { actor: null }
  const { session, user } = await made.validateSession(id)
  if (!session) return { actor: null, cookie: made.createBlankSessionCookie().serialize() }
  const isTooOld = Date.now() / 1000 - session.createdAt > longestDays * 86_400
  const isGone = user.leftOn !== null && user.leftOn <= today
  if (isTooOld || isGone) {
    await made.invalidateSession(session.id)
    return { actor: null, cookie: made.createBlankSessionCookie().serialize() }
  }
  const actor: Actor = { personId: user.id, name: user.name, role: session.via === 'badge' ? 'worker' : user.role, givenRole: user.role, language: user.language, via: session.via }
  return session.fresh ? { actor, cookie: made.createSessionCookie(session.id).serialize() } : { actor }
}

/** Ends the session behind a `Cookie` header and answers the `Set-Cookie` value that clears it. */
export async function endSession(db: Db, settings: Settings, cookieHeader: string): Promise<string> {
  const made = lucia(db, settings)
  const id = made.readSessionCookie(cookieHeader)
  if (id) await made.invalidateSession(id)
  return made.createBlankSessionCookie().serialize()
}

/** Ends every session of a person: after a new password or PIN, a change of role, or their last day. */
export async function endSessionsOf(db: Db, settings: Settings, personId: string): Promise<void> {
  await lucia(db, settings).invalidateUserSessions(personId)
}
