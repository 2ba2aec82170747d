import { packetList, packetQuery } from '#shared/schemas/packets'
import { readPackets } from '../../services/packets'

export default defineRoute({
  summary: 'Site packets within reach, with every look at them',
  ability: 'packets.make', query: packetQuery, answer: packetList,
}, ({ work, query }) => readPackets(work, query))
