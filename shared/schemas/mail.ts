import { z } from 'zod'
import { id, listOf, paging } from './common'

export const mailStates = ['queued', 'sent', 'failed'] as const
export const mailQuery = z.strictObject({ state: z.enum(mailStates).optional(), ...paging })
export type MailQuery = z.infer<typeof mailQuery>

/** One message of the queue; links that would let somebody in are cut from `body`. */
export const mailView = z.object({
  id: z.string(), recipient: z.string(), personId: z.string().nullable(), subject: z.string(), body: z.string(), channel: z.enum(['mail', 'text']), state: z.enum(mailStates),
  tries: z.number().int(), nextTryAt: z.string().nullable(), lastError: z.string().nullable(), createdAt: z.string(), sentAt: z.string().nullable(),
})
export type MailView = z.infer<typeof mailView>
/** A page of the queue, and whether this server has a mail server to send through. */
export const mailList = listOf(mailView).extend({ canSend: z.boolean(), canText: z.boolean() })
/** What the next run of the reminders would send. */
export const reminderPreview = z.object({ items: z.array(z.object({ recipient: z.string(), name: z.string(), subject: z.string(), body: z.string() })) })
export type ReminderPreview = z.infer<typeof reminderPreview>

/** Whose strips: rostered at a site today, or everybody within reach; ending within so many days. */
export const stripsQuery = z.strictObject({ site: id.optional(), within: z.coerce.number().int().min(0).max(366).default(60) })
