import { z } from 'zod'
import { idParams, language } from '#shared/schemas/common'
import { readSheetPdf } from '../../../services/sheet-pdf'

export default defineRoute({
  summary: 'The sealed sheet on paper (PDF)',
  ability: 'briefing.read', params: idParams, query: z.strictObject({ language: language.optional() }),
}, async ({ work, params, query, event }) => {
  const { bytes, name } = await readSheetPdf(work, params.id, query.language ?? work.actor.language, originOf(event))
  setResponseHeader(event, 'content-type', 'application/pdf')
  setResponseHeader(event, 'content-disposition', `inline; filename="${name}"`)
  return bytes
})
