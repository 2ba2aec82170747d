import { z } from 'zod'
import { roles } from '../domain/states'
import { language, line } from './common'

/** By e-mail and password, or by badge and PIN. */
export const signInBody = z.union([
  z.strictObject({ email: z.string().trim().toLowerCase().min(1, 'is empty').max(254), password: z.string().min(1, 'is empty').max(1000) }),
  z.strictObject({ badge: line(40), pin: z.string().trim().min(1, 'is empty').max(20) }),
], 'needs email and password, or badge and pin')
export type SignInBody = z.infer<typeof signInBody>

export const sessionView = z.object({ person: z.object({ id: z.string(), name: z.string(), role: z.enum(roles), language }) })
export type SessionView = z.infer<typeof sessionView>
