import { idParams } from '#shared/schemas/common'
import { credentialView, withdrawalBody } from '#shared/schemas/credentials'
import { withdrawCredential } from '~~/server/services/credentials'

export default defineRoute({
  summary: 'Withdraw a credential from today on',
  ability: 'credentials.verify',
  params: idParams,
  body: withdrawalBody,
  answer: credentialView,
}, ({ work, params, body }) => withdrawCredential(work, params.id, body))
