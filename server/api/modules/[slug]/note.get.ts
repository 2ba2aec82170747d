import { moduleNoteParams, moduleNoteView } from '#shared/schemas/company-texts'
import { readModuleNote } from '../../../services/company-texts'

export default defineRoute({
  summary: 'The company\'s note on a module, with its versions',
  ability: 'companyTexts.write', params: moduleNoteParams, answer: moduleNoteView,
}, ({ work, params }) => readModuleNote(work, params.slug))
