import { importAnswer, importQuery } from '#shared/schemas/imports'
import { importPeople } from '~~/server/services/imports/import-people'

export default defineRoute({
  summary: 'Take people from a CSV or XLSX (multipart, field `file`); all rows or none',
  ability: 'imports.run',
  query: importQuery,
  answer: importAnswer,
}, async ({ work, query, event }) => importPeople(work, (await readUpload(event)).bytes, query))
