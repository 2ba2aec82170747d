import { z } from 'zod'
import { tableFormats } from '#shared/schemas/common'
import { exportRules } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every rule in words, as a file',
  ability: 'lists.export',
  query: z.strictObject({ format: z.enum(tableFormats) }),
}, async ({ work, query, event }) => sendDownload(event, await exportRules(work, query)))
