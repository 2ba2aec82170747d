import { z } from 'zod'
import { tableFormats } from '#shared/schemas/common'
import { exportTalks } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every talk, as a file',
  ability: 'briefing.read',
  query: z.strictObject({ format: z.enum(tableFormats) }),
}, async ({ work, query, event }) => sendDownload(event, await exportTalks(work, (await readTalks(event)).values(), query)))
