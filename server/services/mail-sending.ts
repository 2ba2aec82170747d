import { createTransport } from 'nodemailer'
import type { Db } from '../data/database'
import { listDueMail, updateMail, type MailRow } from '../data/mail'
import { withoutSecrets } from './mail'
import type { Settings } from './settings'

/** Sends one message; throws when the server behind it did not take it. */
export type Deliver = (mail: Pick<MailRow, 'id' | 'recipient' | 'subject' | 'body' | 'channel' | 'calendar'>) => Promise<void>

const mostTries = 10
const firstWaitMinutes = 1
const longestWaitMinutes = 6 * 60
const batch = 50
const secondsToAnswer = 15

/** Minutes until the next try after `tries` failed ones: 1, 2, 4 … at most six hours. */
export const waitMinutes = (tries: number) => Math.min(longestWaitMinutes, firstWaitMinutes * 2 ** (tries - 1))

/** A way to deliver through an SMTP server. The Message-ID is the queue's own, so that a repeat can be told from a second message. */
export function smtpDelivery(smtpUrl: string, from: string): { deliver: Deliver, close: () => void } {
  const limit = secondsToAnswer * 1000
  const transport = createTransport({ url: smtpUrl, connectionTimeout: limit, greetingTimeout: limit, socketTimeout: limit, disableFileAccess: true, disableUrlAccess: true })
  return {
    deliver: async ({ id, recipient, subject, body, calendar }) => {
      const icalEvent = calendar === null ? undefined : { method: /^METHOD:(\w+)/m.exec(calendar)?.[1] ?? 'PUBLISH', filename: 'session.ics', content: calendar }
      await transport.sendMail({ from, to: { name: '', address: recipient }, subject, text: body, icalEvent, messageId: `<${id}@pourwright>`, headers: { 'Auto-Submitted': 'auto-generated' } })
    },
    close: () => transport.close(),
  }
}

/**
 * A way to deliver text messages: a POST of `{ id, to, text }` as JSON to the gateway of the company's choice, with
 * user and password of the address as basic authentication. The same `id` may come twice and means the same message.
 */
export function textDelivery(textUrl: string): Deliver {
  const { username, password, href } = new URL(textUrl)
  const url = new URL(href)
  url.username = ''
  url.password = ''
  return async ({ id, recipient, body }) => {
    const answer = await fetch(url, {
      method: 'POST', redirect: 'error', signal: AbortSignal.timeout(secondsToAnswer * 1000),
      headers: { 'content-type': 'application/json', ...(username && { authorization: `Basic ${Buffer.from(`${decodeURIComponent(username)}:${decodeURIComponent(password)}`).toString('base64')}` }) },
      body: JSON.stringify({ id, to: recipient, text: body }),
    })
    if (!answer.ok) throw new Error(`The text gateway answered ${answer.status}`)
  }
}

async function sendOne(db: Db, mail: MailRow, deliver: Deliver, now: string): Promise<boolean> {
  try {
    await deliver(mail)
  }
  catch (error) {
    const tries = mail.tries + 1
    const lastError = withoutSecrets(String(error instanceof Error ? error.message : error)).slice(0, 500)
    const nextTryAt = new Date(Date.parse(now) + waitMinutes(tries) * 60_000).toISOString()
    await updateMail(db, mail.id, tries >= mostTries ? { state: 'failed', tries, lastError } : { tries, lastError, nextTryAt })
    return false
  }
  await updateMail(db, mail.id, { state: 'sent', tries: mail.tries + 1, sentAt: now, lastError: null, body: withoutSecrets(mail.body) })
  return true
}

const running = new WeakMap<Db, Promise<number>>()

/**
 * Sends what is due and answers how many went out. At least once: a message is marked sent after the mail server took
 * it. What fails waits longer each time and is given up after ten tries. Two runs never overlap: a second call waits
 * for the first and answers the same.
 */
export async function sendDueMail(db: Db, deliver: Deliver, now: () => string, channels: readonly MailRow['channel'][] = ['mail', 'text']): Promise<number> {
  const underWay = running.get(db)
  if (underWay) return underWay
  const run = (async () => {
    let sent = 0
    for (;;) {
      const due = await listDueMail(db, now(), batch, channels)
      for (const mail of due) sent += await sendOne(db, mail, deliver, now()) ? 1 : 0
      if (due.length < batch) return sent
    }
  })().finally(() => running.delete(db))
  running.set(db, run)
  return run
}

/** Sends what is due through the configured mail server and text gateway; what has none stays queued, visible to the admin. */
export async function sendQueued(db: Db, settings: Settings): Promise<number> {
  const mail = settings.smtpUrl ? smtpDelivery(settings.smtpUrl, settings.mailFrom) : null
  const text = settings.textUrl ? textDelivery(settings.textUrl) : null
  const channels = [...(mail ? ['mail' as const] : []), ...(text ? ['text' as const] : [])]
  if (channels.length === 0) return 0
  try {
    return await sendDueMail(db, message => (message.channel === 'text' ? text!(message) : mail!.deliver(message)), settings.clock.now, channels)
  }
  finally {
    mail?.close()
  }
}
