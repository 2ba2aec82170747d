import type { Db } from '../data/database'
import { insertMail, type NewMail } from '../data/mail'

/** Addresses and subjects become headers of a message: nothing in them may start another line. */
const oneLine = (text: string) => text.replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ').trim()

/** A phone number as gateways take it (E.164): what has no country code is taken as of the US. Null for what is no number. */
export function toNumber(typed: string): string | null {
  const digits = typed.replace(/[\s().-]/g, '')
  if (/^\+[1-9]\d{7,14}$/.test(digits)) return digits
  if (/^1?\d{10}$/.test(digits)) return `+1${digits.slice(-10)}`
  return null
}

/**
 * Puts a plain-text message into the queue, inside the caller's transaction if there is one. It goes out later, at
 * least once; the same `key` is queued once, ever. Throws on a recipient that is not exactly one address, or for a text
 * message not a phone number.
 */
export async function queueMail(db: Db, mail: NewMail): Promise<void> {
  const recipient = oneLine(mail.recipient)
  if (mail.channel !== 'text' && !/^[^\s,;:<>"]+@[^\s,;:<>"@]+$/.test(recipient)) throw new Error(`Not one mail address: ${JSON.stringify(recipient)}`)
  if (mail.channel === 'text' && toNumber(recipient) === null) throw new Error('Not a phone number')
  await insertMail(db, { ...mail, recipient: mail.channel === 'text' ? toNumber(recipient)! : recipient, subject: oneLine(mail.subject).slice(0, 200) })
}

/**
 * What of a message may be shown and kept once it is sent: links that let somebody in are cut, so that neither the
 * admin who looks at the queue nor a stolen database can use another person's.
 */
export const withoutSecrets = (body: string) => body.replace(/(\/(?:reset|join|packet)\/)[\w-]+/g, '$1…')
