import { sessionView, signInBody } from '#shared/schemas/session'
import { signIn } from '../services/sign-in'

export default definePublicRoute({
  summary: 'Sign in by e-mail and password, or by badge and PIN',
  body: signInBody,
  answer: sessionView,
  status: 200,
}, async ({ work, body, event }) => {
  const { cookie, person } = await signIn({ ...work, actor: null }, body, addressOf(event))
  appendResponseHeader(event, 'set-cookie', cookie)
  return { person }
})
