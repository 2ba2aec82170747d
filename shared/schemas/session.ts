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

/** What somebody may change about their own session: the language, which is kept with the person. */
export const sessionChanges = z.strictObject({ language })

/** A password as somebody types it; how good it is, is judged when it is set. */
export const password = z.string().min(1, 'is empty').max(1000, 'at most 1000 characters')
/** A PIN as somebody types it. */
export const pin = z.string().trim().min(1, 'is empty').max(20, 'at most 20 characters')

/** A new password or PIN, asked for with the one used to sign in. */
export const newSecretBody = z.union([
  z.strictObject({ current: password, password }),
  z.strictObject({ current: password, pin }),
], 'needs current, and password or pin')
export type NewSecretBody = z.infer<typeof newSecretBody>

/** One's own ways in, for the account page. */
export const ownWaysView = z.object({ via: z.enum(['password', 'badge']), badge: z.string(), email: z.string().nullable(), hasPin: z.boolean(), hasPassword: z.boolean() })
