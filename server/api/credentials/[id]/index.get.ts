import { idParams } from '#shared/schemas/common'
import { credentialView } from '#shared/schemas/credentials'
import { readCredential } from '~~/server/services/credentials'

export default defineRoute({
  summary: 'One credential',
  ability: 'credentials.read',
  params: idParams,
  answer: credentialView,
}, ({ work, params }) => readCredential(work, params.id))
