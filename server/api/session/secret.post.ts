import { newSecretBody } from '#shared/schemas/session'
import { changeOwnSecret } from '../../services/own-sign-in'

export default defineRoute({
  summary: 'Change one\'s own password or PIN; every other session ends',
  ability: 'own.records',
  body: newSecretBody,
  status: 204,
}, async ({ work, body, event }) => {
  appendResponseHeader(event, 'set-cookie', await changeOwnSecret(work, body))
})
