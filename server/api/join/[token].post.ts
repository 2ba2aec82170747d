import { joinBody, tokenParams } from '#shared/schemas/links'
import { sessionView } from '#shared/schemas/session'
import { join } from '../../services/join-links'

export default definePublicRoute({
  summary: 'Set the first PIN or password and be signed in; the link ends',
  params: tokenParams,
  body: joinBody,
  answer: sessionView,
}, async ({ work, params, body, event }) => {
  const { cookie, person } = await join({ ...work, actor: null }, params.token, body, addressOf(event))
  appendResponseHeader(event, 'set-cookie', cookie)
  return { person }
})
