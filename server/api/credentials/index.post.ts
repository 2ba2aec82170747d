import { credentialView, newCredential } from '#shared/schemas/credentials'
import { addCredential } from '~~/server/services/credentials'

export default defineRoute({
  summary: 'Add an outside card; it counts once it is verified',
  ability: 'credentials.add',
  body: newCredential,
  answer: credentialView,
  status: 201,
}, ({ work, body }) => addCredential(work, body))
