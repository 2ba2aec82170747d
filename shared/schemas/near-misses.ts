import { z } from 'zod'
import { nearMissKinds } from '../domain/near-misses'
import { id, instant, text } from './common'

export const nearMissBody = z.strictObject({
  siteId: id, kind: z.enum(nearMissKinds), what: text(4000), when: instant, fileIds: z.array(id).max(6).optional(), anonymous: z.boolean().optional(),
})
export type NearMissBody = z.infer<typeof nearMissBody>
export const nearMissView = z.object({
  id: z.string(), siteId: z.string(), site: z.string(), kind: z.enum(nearMissKinds), what: z.string(), when: z.string(), fileIds: z.array(z.string()),
  reportedAt: z.string(), reporter: z.string().nullable(), answer: z.string().nullable(), answeredBy: z.string().nullable(), answeredAt: z.string().nullable(),
})
export type NearMissView = z.infer<typeof nearMissView>
export const nearMissList = z.object({ items: z.array(nearMissView), mayAnswer: z.boolean() })
export const nearMissAnswer = z.strictObject({ answer: text(4000) })
