import { exportOf, exportFormats } from '#shared/schemas/common'
import { lookAheadQuery } from '#shared/schemas/look-ahead'
import { exportLookAhead } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Whose cards end in the coming weeks, as a file',
  ability: 'lists.export',
  query: exportOf(lookAheadQuery, exportFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportLookAhead(work, query)))
