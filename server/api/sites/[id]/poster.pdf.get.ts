import { idParams } from '#shared/schemas/common'
import { posterOf } from '../../../services/poster'

export default defineRoute({
  summary: 'The poster with the site\'s QR (PDF)',
  ability: 'people.read', params: idParams,
}, async ({ work, params, event }) => {
  const { bytes, name } = await posterOf(work, params.id, originOf(event))
  setResponseHeader(event, 'content-type', 'application/pdf')
  setResponseHeader(event, 'content-disposition', `inline; filename="${name}"`)
  return bytes
})
