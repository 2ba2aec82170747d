import { z } from 'zod'
import { tableFormats } from '#shared/schemas/common'
import { exportPackets } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every site packet and how often it was looked at, as a file',
  ability: 'packets.make',
  query: z.strictObject({ format: z.enum(tableFormats) }),
}, async ({ work, query, event }) => sendDownload(event, await exportPackets(work, query)))
