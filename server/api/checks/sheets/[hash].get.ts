import { z } from 'zod'
import { sheetCheckView } from '#shared/schemas/briefing'
import { checkSheet } from '../../../services/sheets'

export default definePublicRoute({
  summary: 'Recheck a sealed sheet by its hash',
  params: z.strictObject({ hash: z.string().max(100) }), answer: sheetCheckView,
}, ({ work, params }) => checkSheet(work.db, work.settings, params.hash))
