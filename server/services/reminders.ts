import { dateInZone } from '#shared/domain/dates'
import type { CredentialItem } from '#shared/schemas/credentials'
import { appendAudit } from '../data/audit'
import { getCompany } from '../data/company'
import type { Db } from '../data/database'
import { insertReminderMarks, listHoldersWithForeman, listReminderMarks, listSafetyManagers, wasRemindedOn, type Addressee, type ReminderStep } from '../data/reminders'
import { listCredentialIds, listCredentialsByIds } from '../data/views/credential-list'
import { reminderLines, reminderMail, reminderText } from '../documents/reminder-mail'
import { reminderStrips } from '../documents/reminder-strips'
import { toCredentialQuery } from './credentials'
import { sha256 } from './hashing'
import { queueMail, toNumber } from './mail'
import { badField, notFound } from './refusal'
import type { Settings } from './settings'
import type { Work } from './work'

/** The warning that is due with so many days left: the last one reached, so that downtime skips what it overtook. Null while more than 60 are left. */
export function reminderStep(daysLeft: number): ReminderStep | null {
  if (daysLeft < 0) return 'after'
  if (daysLeft <= 7) return 'd7'
  if (daysLeft <= 30) return 'd30'
  return daysLeft <= 60 ? 'd60' : null
}

interface Digest { recipient: Addressee & { email: string }, items: CredentialItem[] }

/** Groups lines by who is told: the holder, the holder's foreman, and `everything` the others; people without an address fall out. */
async function toDigests(db: Db, items: CredentialItem[], today: string, everything: Addressee[]): Promise<{ digests: Digest[], withoutEmail: Addressee[] }> {
  const holders = await listHoldersWithForeman(db, [...new Set(items.map(item => item.personId))], today)
  const digests = new Map<string, Digest>()
  const withoutEmail = new Map<string, Addressee>()
  for (const item of items) {
    const { holder, foreman } = holders.get(item.personId)!
    if (!holder.email) withoutEmail.set(holder.personId, holder)
    const told = new Map([holder, ...(foreman ? [foreman] : []), ...everything].map(person => [person.personId, person]))
    for (const recipient of told.values()) {
      if (!recipient.email) continue
      const digest = digests.get(recipient.personId) ?? { recipient: { ...recipient, email: recipient.email }, items: [] }
      digest.items.push(item)
      digests.set(recipient.personId, digest)
    }
  }
  return { digests: [...digests.values()], withoutEmail: [...withoutEmail.values()] }
}

async function queueDigests(db: Db, digests: Digest[], options: { keyOf: (digest: Digest) => string, origin: string, now: string }): Promise<void> {
  for (const digest of digests) {
    const { subject, body } = reminderMail({ recipient: digest.recipient, items: digest.items, origin: options.origin })
    await queueMail(db, { key: options.keyOf(digest), recipient: digest.recipient.email, personId: digest.recipient.personId, subject, body, now: options.now })
  }
}

/** The effective credentials of people now employed that have a warning due which they did not have yet. */
async function listDue(db: Db, today: string): Promise<{ item: CredentialItem, step: ReminderStep }[]> {
  const ids = await listCredentialIds(db, { scope: { all: true }, today, within: 60, includeExpired: true }, 'en')
  const marks = await listReminderMarks(db, ids)
  const due: { item: CredentialItem, step: ReminderStep }[] = []
  for (let start = 0; start < ids.length; start += 500) {
    for (const item of await listCredentialsByIds(db, ids.slice(start, start + 500), today)) {
      const step = item.daysLeft === null ? null : reminderStep(item.daysLeft)
      if (step && !marks.has(`${item.id}/${step}/${item.expiresOn}`)) due.push({ item, step })
    }
  }
  return due
}

/** The holders' own lines as text messages, where the company sends them and a phone number is known. */
async function queueTexts(db: Db, items: CredentialItem[], { today, origin, now }: { today: string, origin: string, now: string }): Promise<void> {
  const holders = await listHoldersWithForeman(db, [...new Set(items.map(item => item.personId))], today)
  const byHolder = new Map<string, CredentialItem[]>()
  for (const item of items) byHolder.set(item.personId, [...byHolder.get(item.personId) ?? [], item])
  for (const { holder } of holders.values()) {
    if (!holder.phone || toNumber(holder.phone) === null) continue
    const body = reminderText({ recipient: holder, items: byHolder.get(holder.personId)!, origin })
    await queueMail(db, { key: `reminder-text:${today}:${holder.personId}`, channel: 'text', recipient: holder.phone, personId: holder.personId, subject: '', body, now })
  }
}

/**
 * Queues the day's reminders: at 60, 30 and 7 days and from the day after expiry, one digest a person and day, to the
 * holder, their foreman and the safety managers. Run it as often as you like: a day's digests go out once, what was
 * missed while the server was down goes out at the next run, and nothing is told twice. Answers how many messages.
 */
export async function queueReminders(db: Db, settings: Settings): Promise<number> {
  const now = settings.clock.now()
  const company = await getCompany(db)
  const today = dateInZone(now, company.timeZone)
  if (await wasRemindedOn(db, today)) return 0
  const due = await listDue(db, today)
  if (due.length === 0) return 0
  const { digests } = await toDigests(db, due.map(({ item }) => item), today, await listSafetyManagers(db, today))
  await db.transaction(async (trx) => {
    await queueDigests(trx, digests, { keyOf: digest => `reminder:${today}:${digest.recipient.personId}`, origin: settings.linkOrigin, now })
    if (company.textReminders) await queueTexts(trx, due.map(({ item }) => item), { today, origin: settings.linkOrigin, now })
    await insertReminderMarks(trx, due.map(({ item, step }) => ({ credentialId: item.id, step, expiresOn: item.expiresOn!, remindedOn: today })))
  })
  return digests.length
}

/**
 * Queues reminders about chosen credentials to their holders and foremen, now. The same choice is sent once a day.
 * Answers how many messages, and which holders have no address. 404 for an unknown credential, 422 where one never expires.
 */
export async function sendReminders(work: Work, credentialIds: string[]): Promise<{ queued: number, withoutEmail: { personId: string, name: string }[] }> {
  const items: CredentialItem[] = []
  const ids = [...new Set(credentialIds)]
  for (let start = 0; start < ids.length; start += 500) items.push(...await listCredentialsByIds(work.db, ids.slice(start, start + 500), work.today))
  if (items.length < ids.length) throw notFound('credential')
  if (items.some(item => item.expiresOn === null)) throw badField('credentialIds', 'one of them never expires', 'neverExpires')
  const { digests, withoutEmail } = await toDigests(work.db, items, work.today, [])
  const keyOf = ({ recipient, items }: Digest) => `reminder-sent:${work.today}:${recipient.personId}:${sha256(items.map(item => item.id).sort().join()).slice(0, 24)}`
  await work.db.transaction(async (trx) => {
    await queueDigests(trx, digests, { keyOf, origin: work.settings.linkOrigin, now: work.now })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'reminders.sent', subject: { kind: 'company', id: '1' }, after: { credentials: ids.length, messages: digests.length } })
  })
  return { queued: digests.length, withoutEmail: withoutEmail.map(({ personId, name }) => ({ personId, name })) }
}

/** What the next run would send, without sending it: to whom, and the words. */
export async function previewReminders(work: Work): Promise<{ items: { recipient: string, name: string, subject: string, body: string }[] }> {
  const { db, today, settings } = work
  const due = await listDue(db, today)
  const { digests } = await toDigests(db, due.map(({ item }) => item), today, await listSafetyManagers(db, today))
  return { items: digests.map(({ recipient, items }) => ({ recipient: recipient.email, name: recipient.name, ...reminderMail({ recipient, items, origin: settings.linkOrigin }) })) }
}

/** Paper strips of what ends within so many days or has ended, for the people the actor may see at a site; 404 when nothing does. */
export async function printStrips(work: Work, { site, within }: { site?: string, within: number }): Promise<Buffer> {
  const { db, today, actor, company } = work
  const ids = await listCredentialIds(db, await toCredentialQuery(work, { site, within, includeExpired: true, effective: true, sort: 'person' }), actor.language)
  const items: CredentialItem[] = []
  for (let start = 0; start < ids.length; start += 500) items.push(...await listCredentialsByIds(db, ids.slice(start, start + 500), today))
  if (items.length === 0) throw notFound('reminder')
  const holders = await listHoldersWithForeman(db, [...new Set(items.map(item => item.personId))], today)
  const strips = [...holders.values()].map(({ holder }) => {
    const own = items.filter(item => item.personId === holder.personId)
    return { name: holder.name, language: holder.language, crew: own[0]!.crew ?? null, sortName: own[0]!.sortName, ...reminderLines({ recipient: holder, items: own }) }
  }).sort((one, other) => (one.crew ?? '').localeCompare(other.crew ?? '') || one.sortName.localeCompare(other.sortName))
  return reminderStrips(strips, { language: actor.language, company: company.name, today })
}
