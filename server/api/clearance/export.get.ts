import { exportOf, tableFormats } from '#shared/schemas/common'
import { boardQuery } from '#shared/schemas/clearance'
import { exportBoard } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'The board of a site and date: who may do what, until when, and what is missing, as a file',
  ability: 'lists.export',
  query: exportOf(boardQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportBoard(work, query)))
