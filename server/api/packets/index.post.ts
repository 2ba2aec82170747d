import { previewQuery } from '#shared/schemas/crews-and-sites'
import { packetBody, packetMade, packetPreview } from '#shared/schemas/packets'
import { makePacket, previewPacket } from '../../services/packets'

export default defineRoute({
  summary: 'Make a site\'s packet and its link; with `preview=true` only show what it would hold',
  ability: 'packets.make', query: previewQuery, body: packetBody, answer: packetMade.or(packetPreview), status: 201, previews: true,
}, ({ work, query, body }) => (query.preview ? previewPacket(work, body) : makePacket(work, body)))
