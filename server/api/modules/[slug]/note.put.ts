import { moduleNoteBody, moduleNoteParams, moduleNoteView } from '#shared/schemas/company-texts'
import { saveModuleNote } from '../../../services/company-texts'

export default defineRoute({
  summary: 'Save the company\'s note on a module',
  ability: 'companyTexts.write', params: moduleNoteParams, body: moduleNoteBody, answer: moduleNoteView,
}, ({ work, params, body }) => saveModuleNote(work, params.slug, body))
