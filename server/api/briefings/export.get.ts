import { exportOf, exportFormats } from '#shared/schemas/common'
import { briefingsQuery } from '#shared/schemas/briefing'
import { exportBriefings } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every briefing of the filtered list, as a file',
  ability: 'lists.export',
  query: exportOf(briefingsQuery, exportFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportBriefings(work, query)))
