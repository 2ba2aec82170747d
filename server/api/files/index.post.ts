import { z } from 'zod'
import { keepUpload } from '~~/server/services/files'

export default defineRoute({
  summary: 'Upload a picture or PDF (multipart, field `file`, at most 10 MB)',
  ability: 'own.records',
  answer: z.object({ id: z.string(), type: z.string(), size: z.number().int() }),
  status: 201,
}, async ({ work, event }) => keepUpload(work, (await readUpload(event)).bytes))
