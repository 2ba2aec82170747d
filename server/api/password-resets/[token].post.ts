import { resetBody, tokenParams } from '#shared/schemas/links'
import { sessionView } from '#shared/schemas/session'
import { resetPassword } from '../../services/password-resets'

export default definePublicRoute({
  summary: 'Set a new password with a mailed link and be signed in; the link and all other sessions end',
  params: tokenParams,
  body: resetBody,
  answer: sessionView,
}, async ({ work, params, body, event }) => {
  const { cookie, person } = await resetPassword({ ...work, actor: null }, params.token, body.password, addressOf(event))
  appendResponseHeader(event, 'set-cookie', cookie)
  return { person }
})
