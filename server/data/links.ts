import type { Db } from './database'

/** A mailed or shown link; only the SHA-256 of its word is kept. Instants are ISO. */
export interface LinkRow {
  tokenHash: string
  kind: 'join' | 'passwordReset' | 'calendar'
  personId: string
  createdBy: string | null
  createdAt: string
  expiresAt: string | null
  usedAt: string | null
}

/** Writes a new link. */
export async function insertLink(db: Db, link: Omit<LinkRow, 'usedAt'>): Promise<void> {
  await db('links').insert(link)
}

/** The link of that kind if it can still be used at `now`, otherwise undefined. */
export async function getUsableLink(db: Db, kind: LinkRow['kind'], tokenHash: string, now: string): Promise<LinkRow | undefined> {
  return db('links').where({ kind, tokenHash }).whereNull('usedAt').where('expiresAt', '>', now).first()
}

/** Uses a link up; false when somebody did so first or its time is over. */
export async function useLinkUp(db: Db, tokenHash: string, now: string): Promise<boolean> {
  const changed = await db('links').where({ tokenHash }).whereNull('usedAt').where('expiresAt', '>', now).update({ usedAt: now })
  return changed === 1
}

/** Ends a person's links of one kind, so that only the newest ever works. */
export async function endLinks(db: Db, kind: LinkRow['kind'], personId: string, now: string): Promise<void> {
  await db('links').where({ kind, personId }).whereNull('usedAt').update({ usedAt: now })
}
