import { idParams } from '#shared/schemas/common'
import { makeCardToken } from '~~/server/services/cards'

export default defineRoute({
  summary: 'The card as an open signed token (Ed25519)',
  ability: 'credentials.read',
  params: idParams,
}, async ({ work, params, event }) => sendDownload(event, { body: await makeCardToken(work, params.id, originOf(event)), type: 'application/jwt', fileName: 'card.jwt' }))
