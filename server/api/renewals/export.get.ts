import { z } from 'zod'
import { exportFormats } from '#shared/schemas/common'
import { exportRenewals } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every renewal session with its people, as a file',
  ability: 'renewals.manage',
  query: z.strictObject({ format: z.enum(exportFormats) }),
}, async ({ work, query, event }) => sendDownload(event, await exportRenewals(work, query)))
