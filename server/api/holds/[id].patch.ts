import { idParams } from '#shared/schemas/common'
import { previewQuery } from '#shared/schemas/crews-and-sites'
import { holdChanges, holdView, previewView } from '#shared/schemas/requirements'
import { changeHold } from '../../services/holds'

export default defineRoute({
  summary: 'Move or end a hold, or preview whom that would stop',
  ability: 'requirements.write',
  params: idParams,
  query: previewQuery,
  body: holdChanges,
  answer: holdView.or(previewView),
}, ({ work, params, body, query }) => changeHold(work, params.id, body, query))
