import { idParams } from '#shared/schemas/common'
import { endPacket } from '../../../services/packets'

export default defineRoute({
  summary: 'End a packet\'s link',
  ability: 'packets.make', params: idParams, status: 204,
}, ({ work, params }) => endPacket(work, params.id))
