import { idParams } from '#shared/schemas/common'
import { credentialView, verificationBody } from '#shared/schemas/credentials'
import { judgeCredential } from '~~/server/services/credentials'

export default defineRoute({
  summary: 'Accept a card, or reject and keep it',
  ability: 'credentials.verify',
  params: idParams,
  body: verificationBody,
  answer: credentialView,
}, ({ work, params, body }) => judgeCredential(work, params.id, body))
