import { z } from 'zod'
import { languageQuery } from '#shared/schemas/learning'
import { packetPdf } from '~~/server/services/packets'

export default definePublicRoute({
  summary: 'The same packet as a PDF',
  params: z.strictObject({ token: z.string().min(1).max(100) }), query: languageQuery,
}, async ({ work, params, query, event }) => sendDownload(event, await packetPdf(work, params.token, { language: query.language ?? work.company.language, origin: originOf(event) }), 'inline'))
