import { importAnswer, importQuery } from '#shared/schemas/imports'
import { importCredentials } from '~~/server/services/imports/import-credentials'

export default defineRoute({
  summary: 'Take credentials from a CSV or XLSX (multipart, field `file`); all rows or none',
  ability: 'imports.run',
  query: importQuery,
  answer: importAnswer,
}, async ({ work, query, event }) => importCredentials(work, (await readUpload(event)).bytes, query))
