import { idParams } from '#shared/schemas/common'
import { sheetJsonView } from '#shared/schemas/briefing'
import { readSheetJson } from '../../../services/sheets'

export default defineRoute({
  summary: 'The sealed sheet as data, with its hash, signature and addenda',
  ability: 'briefing.read', params: idParams, answer: sheetJsonView,
}, ({ work, params }) => readSheetJson(work, params.id))
