import { trainingExportQuery } from '#shared/schemas/training'
import { exportTrainingMinutes } from '~~/server/services/training-minutes'

export default defineRoute({
  summary: 'Counted minutes of required training as CSV or XLSX, for payroll',
  ability: 'trainingMinutes.read',
  query: trainingExportQuery,
}, async ({ work, query, event }) => sendDownload(event, await exportTrainingMinutes(work, query)))
