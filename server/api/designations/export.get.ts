import { exportOf, tableFormats } from '#shared/schemas/common'
import { designationsQuery } from '#shared/schemas/requirements'
import { exportDesignations } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Everybody named in writing, as a file',
  ability: 'lists.export',
  query: exportOf(designationsQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportDesignations(work, query)))
