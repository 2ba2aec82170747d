import { z } from 'zod'
import { email, language } from './common'
import { password, pin } from './session'

/** The word in a join or reset link: at least 128 random bits in URL-safe base64. */
export const token = z.string().min(16).max(64)
export const tokenParams = z.strictObject({ token })

/** A link that lets somebody in for the first time, in words and as an SVG picture of its QR code. */
export const joinLinkView = z.object({ url: z.string(), qr: z.string(), expiresAt: z.string() })

/** What the join page needs to greet somebody and to know what to ask for. */
export const joinView = z.object({ name: z.string(), language, needs: z.enum(['pin', 'password']), badge: z.string(), company: z.string() })
export type JoinView = z.infer<typeof joinView>

/** What the new person chose. */
export const joinBody = z.union([
  z.strictObject({ pin, language }),
  z.strictObject({ password, language }),
], 'needs pin or password, and language')
export type JoinBody = z.infer<typeof joinBody>

export const resetRequestBody = z.strictObject({ email })
export const resetView = z.object({ email: z.string(), language })
export const resetBody = z.strictObject({ password })
