import { z } from 'zod'
import { tableFormats } from '#shared/schemas/common'
import { exportQuestions } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'The questions to trainers that one sees, as a file',
  ability: 'learning.own',
  query: z.strictObject({ format: z.enum(tableFormats) }),
}, async ({ work, query, event }) => sendDownload(event, await exportQuestions(work, await getTeaching(event), query)))
