import { exportOf, tableFormats } from '#shared/schemas/common'
import { peopleQuery } from '#shared/schemas/people'
import { exportPeople } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Everybody of the filtered list, as a file',
  ability: 'lists.export',
  query: exportOf(peopleQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportPeople(work, query)))
