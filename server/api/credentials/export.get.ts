import { credentialExportQuery } from '#shared/schemas/credentials'
import { exportCredentials } from '~~/server/services/credential-export'

export default defineRoute({
  summary: 'The whole filtered list as CSV, XLSX, PDF or iCalendar',
  ability: 'credentials.export',
  query: credentialExportQuery,
}, async ({ work, query: { format, ...filters }, event }) => sendDownload(event, await exportCredentials(work, format, filters)))
