import { randomUUID } from 'node:crypto'
import type { Db } from './database'

export type MailState = 'queued' | 'sent' | 'failed'

/** One message of the queue. Instants are ISO. */
export interface MailRow {
  id: string
  key: string
  recipient: string
  personId: string | null
  subject: string
  body: string
  /** `text` goes to a phone number and has no subject. */
  channel: 'mail' | 'text'
  /** A calendar entry (RFC 5545) that goes with it. */
  calendar: string | null
  state: MailState
  tries: number
  nextTryAt: string
  lastError: string | null
  createdAt: string
  sentAt: string | null
}

export interface NewMail {
  /** The same key is queued once, ever: `password-reset:…`, `reminder:2026-12-01:…`. */
  key: string
  recipient: string
  personId?: string | null
  subject: string
  body: string
  channel?: 'mail' | 'text'
  calendar?: string
  now: string
}

/** Puts a message into the queue; does nothing when its key was queued before. */
export async function insertMail(db: Db, { now, ...mail }: NewMail): Promise<void> {
  await db('mail').insert({ id: randomUUID(), ...mail, personId: mail.personId ?? null, channel: mail.channel ?? 'mail', calendar: mail.calendar ?? null, state: 'queued', tries: 0, nextTryAt: now, createdAt: now }).onConflict('key').ignore()
}

/** Queued messages whose time has come, the longest due first. */
export async function listDueMail(db: Db, now: string, most: number, channels: readonly MailRow['channel'][]): Promise<MailRow[]> {
  return db('mail').where({ state: 'queued' }).whereIn('channel', channels).where('nextTryAt', '<=', now).orderBy(['nextTryAt', 'createdAt', 'id']).limit(most)
}

/** One message, or undefined. */
export async function getMail(db: Db, id: string): Promise<MailRow | undefined> {
  return db('mail').where({ id }).first()
}

/** Writes how sending went. */
export async function updateMail(db: Db, id: string, changes: Partial<Pick<MailRow, 'state' | 'tries' | 'nextTryAt' | 'lastError' | 'sentAt' | 'body'>>): Promise<void> {
  await db('mail').where({ id }).update(changes)
}

/** A page of the queue, the newest first. */
export async function listMail(db: Db, { state, page, perPage }: { state?: MailState, page: number, perPage: number }): Promise<{ rows: MailRow[], total: number }> {
  const chosen = () => db('mail').where(query => state && query.where({ state }))
  const counted = await chosen().count({ total: '*' }).first()
  const rows = await chosen().orderBy([{ column: 'createdAt', order: 'desc' }, { column: 'id' }]).limit(perPage).offset((page - 1) * perPage)
  return { rows, total: Number(counted?.total ?? 0) }
}
