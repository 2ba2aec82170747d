import { z } from 'zod'
import { resetRequestBody } from '#shared/schemas/links'
import { askForReset } from '../../services/password-resets'

export default definePublicRoute({
  summary: 'Ask for a password reset by mail; the answer is the same whether or not the address is known',
  body: resetRequestBody,
  answer: z.object({ ok: z.literal(true) }),
  status: 202,
}, async ({ work, body, event }) => {
  await askForReset({ ...work, actor: null }, body.email)
  event.waitUntil(runTask('mail:send'))
  return { ok: true }
})
