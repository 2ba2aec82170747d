import { idParams } from '#shared/schemas/common'
import { previewQuery } from '#shared/schemas/crews-and-sites'
import { dutyChanges, dutyView, previewView } from '#shared/schemas/requirements'
import { changeDuty } from '../../services/duties'

export default defineRoute({
  summary: 'Change a duty, or preview whom that would stop',
  ability: 'requirements.write',
  params: idParams,
  query: previewQuery,
  body: dutyChanges,
  answer: dutyView.or(previewView),
}, ({ work, params, body, query }) => changeDuty(work, params.id, body, query))
