import { z } from 'zod'
import { tableFormats } from '#shared/schemas/common'
import { exportNearMisses } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every report with what was done about it, as a file',
  ability: 'nearMiss.answer',
  query: z.strictObject({ format: z.enum(tableFormats) }),
}, async ({ work, query, event }) => sendDownload(event, await exportNearMisses(work, query)))
