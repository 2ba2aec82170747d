import { previewQuery } from '#shared/schemas/crews-and-sites'
import { dutyView, newDutyBody, previewView } from '#shared/schemas/requirements'
import { addDuty } from '../../services/duties'

export default defineRoute({
  summary: 'Add a duty, or preview whom that would stop',
  ability: 'requirements.write',
  query: previewQuery,
  body: newDutyBody,
  answer: dutyView.or(previewView),
  status: 201,
  previews: true,
}, ({ work, body, query }) => addDuty(work, body, query))
