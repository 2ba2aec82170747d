import { idParams } from '#shared/schemas/common'
import { makeCardPdf } from '~~/server/services/cards'

export default defineRoute({
  summary: 'The wallet card with its code',
  ability: 'credentials.read',
  params: idParams,
}, async ({ work, params, event }) => sendDownload(event, await makeCardPdf(work, params.id, originOf(event)), 'inline'))
