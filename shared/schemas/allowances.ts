import { z } from 'zod'
import { date, id } from './common'

/** Lets a card that is not verified yet count for one shift at one site. */
export const allowanceBody = z.strictObject({ credentialId: id, siteId: id, date })
export type AllowanceBody = z.infer<typeof allowanceBody>
export const allowanceView = z.object({ id: z.string(), credentialId: z.string(), siteId: z.string(), date: z.string(), allowedBy: z.string(), createdAt: z.string() })
export type AllowanceView = z.infer<typeof allowanceView>
