import { z } from 'zod'
import { id } from '#shared/schemas/common'
import { qrSvg } from '../../../documents/qr'
import { showPresence } from '../../../services/live-code'

export default defineRoute({
  summary: 'The presence code as a QR picture (SVG)',
  ability: 'briefing.run', params: z.strictObject({ id }), query: z.object({ at: z.string().max(40).optional() }),
}, async ({ work, params, event }) => {
  const { url } = await showPresence(work, params.id, originOf(event))
  setResponseHeader(event, 'content-type', 'image/svg+xml')
  return qrSvg(url)
})
