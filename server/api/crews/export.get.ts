import { exportOf, tableFormats } from '#shared/schemas/common'
import { namedListQuery } from '#shared/schemas/crews-and-sites'
import { exportCrews } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every crew with its people and usual slots, as a file',
  ability: 'lists.export',
  query: exportOf(namedListQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportCrews(work, query)))
