import { z } from 'zod'
import { email, language, line, timeZone } from './common'
import { password } from './session'

export const setupView = z.object({ needed: z.boolean() })

/** The first company and its first admin; `token` is what the server printed at start. */
export const setupBody = z.strictObject({
  token: z.string().trim().min(1, 'is empty').max(100),
  company: z.strictObject({ name: line(120), timeZone, language: language.optional() }),
  admin: z.strictObject({ name: line(120), email, password }),
})
export type SetupBody = z.infer<typeof setupBody>
