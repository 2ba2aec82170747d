import { exportOf, tableFormats } from '#shared/schemas/common'
import { auditQuery } from '#shared/schemas/audit'
import { exportAudit } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every row of the filtered trail, as a file',
  ability: 'audit.read',
  query: exportOf(auditQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportAudit(work, query)))
