import { previewQuery } from '#shared/schemas/crews-and-sites'
import { newTypeBody, previewView, typeView } from '#shared/schemas/requirements'
import { addType } from '../../services/credential-types'

export default defineRoute({
  summary: 'Add a credential type, or preview whom that would stop',
  ability: 'requirements.write',
  query: previewQuery,
  body: newTypeBody,
  answer: typeView.or(previewView),
  status: 201,
  previews: true,
}, ({ work, body, query }) => addType(work, body, query))
