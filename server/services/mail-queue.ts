import type { MailQuery, MailView } from '#shared/schemas/mail'
import { appendAudit } from '../data/audit'
import { getMail, listMail, updateMail, type MailRow } from '../data/mail'
import { withoutSecrets } from './mail'
import { notFound, Refusal } from './refusal'
import type { Work } from './work'

function toView({ id, recipient, personId, subject, body, channel, state, tries, nextTryAt, lastError, createdAt, sentAt }: MailRow): MailView {
  return { id, recipient, personId, subject, body: withoutSecrets(body), channel, state, tries, nextTryAt: state === 'queued' ? nextTryAt : null, lastError, createdAt, sentAt }
}

/** A page of the mail queue, the newest first. */
export async function readMailQueue(work: Work, { state, page, perPage }: MailQuery) {
  const { rows, total } = await listMail(work.db, { state, page, perPage })
  return { items: rows.map(toView), total, page, perPage, canSend: work.settings.smtpUrl !== '', canText: work.settings.textUrl !== '' }
}

/** Puts a failed or waiting message in front again, with all its tries. Throws 409 for one that was sent. */
export async function retryMail(work: Work, id: string): Promise<MailView> {
  const mail = await work.db.transaction(async (trx) => {
    const row = await getMail(trx, id)
    if (!row) throw notFound('message')
    if (row.state === 'sent') throw new Refusal('conflict', 'alreadySent', { message: 'This message was sent' })
    await updateMail(trx, id, { state: 'queued', tries: 0, nextTryAt: work.now })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'mail.retried', subject: { kind: 'mail', id } })
    return { ...row, state: 'queued' as const, tries: 0, nextTryAt: work.now }
  })
  return toView(mail)
}
