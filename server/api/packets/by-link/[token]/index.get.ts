import { z } from 'zod'
import { packetView } from '#shared/schemas/packets'
import { viewPacket } from '~~/server/services/packets'

export default definePublicRoute({
  summary: 'A packet, for who has its link; every look is noted',
  params: z.strictObject({ token: z.string().min(1).max(100) }), answer: packetView,
}, ({ work, params }) => viewPacket(work, params.token))
