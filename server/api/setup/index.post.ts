import { sessionView } from '#shared/schemas/session'
import { setupBody } from '#shared/schemas/setup'
import { setUp } from '../../services/setup'

export default definePublicRoute({
  summary: 'Set up an empty database: the company and its first admin, with the token that the server printed',
  body: setupBody,
  answer: sessionView,
  status: 201,
}, async ({ work, body, event }) => {
  const { cookie, person } = await setUp({ ...work, actor: null }, body, addressOf(event))
  appendResponseHeader(event, 'set-cookie', cookie)
  return { person }
})
