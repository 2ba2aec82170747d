import { idParams } from '#shared/schemas/common'
import { previewQuery } from '#shared/schemas/crews-and-sites'
import { previewView, typeChanges, typeView } from '#shared/schemas/requirements'
import { changeType } from '../../services/credential-types'

export default defineRoute({
  summary: 'Change a credential type, or preview whom that would stop',
  ability: 'requirements.write',
  params: idParams,
  query: previewQuery,
  body: typeChanges,
  answer: typeView.or(previewView),
}, ({ work, params, body, query }) => changeType(work, params.id, body, query))
