import { exportOf, tableFormats } from '#shared/schemas/common'
import { namedListQuery } from '#shared/schemas/crews-and-sites'
import { exportSites } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every site, as a file',
  ability: 'lists.export',
  query: exportOf(namedListQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportSites(work, query)))
