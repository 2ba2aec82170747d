import { createTransport } from 'nodemailer'
import type { Db } from '../data/database'
import { listDueMail, updateMail, type MailRow } from '../data/mail'
import { withoutSecrets } from './mail'
import type { Settings } from './settings'

/** Sends one message; throws when the mail server did not take it. */
export type Deliver = (mail: Pick<MailRow, 'id' | 'recipient' | 'subject' | 'body'>) => Promise<void>

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
    deliver: async ({ id, recipient, subject, body }) => {
      await transport.sendMail({ from, to: { name: '', address: recipient }, subject, text: body, messageId: `<${id}@pourwright>`, headers: { 'Auto-Submitted': 'auto-generated' } })
    },
    close: () => transport.close(),
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
export async function sendDueMail(db: Db, deliver: Deliver, now: () => string): Promise<number> {
  const underWay = running.get(db)
  if (underWay) return underWay
  const run = (async () => {
    let sent = 0
    for (;;) {
      const due = await listDueMail(db, now(), batch)
      for (const mail of due) sent += await sendOne(db, mail, deliver, now()) ? 1 : 0
      if (due.length < batch) return sent
    }
  })().finally(() => running.delete(db))
  running.set(db, run)
  return run
}

/** Sends what is due through the configured mail server; without one everything stays queued, visible to the admin. */
export async function sendThroughSmtp(db: Db, settings: Settings): Promise<number> {
  if (!settings.smtpUrl) return 0
  const { deliver, close } = smtpDelivery(settings.smtpUrl, settings.mailFrom)
  try {
    return await sendDueMail(db, deliver, settings.clock.now)
  }
  finally {
    close()
  }
}
