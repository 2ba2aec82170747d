import { previewBody, previewView } from '#shared/schemas/company-texts'
import { toTextTree } from '../../services/company-markdown'

export default defineRoute({
  summary: 'How a company\'s Markdown will look',
  ability: 'companyTexts.write', body: previewBody, answer: previewView,
}, ({ body }) => ({ body: toTextTree(body.text) }))
