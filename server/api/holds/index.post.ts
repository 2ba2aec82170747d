import { previewQuery } from '#shared/schemas/crews-and-sites'
import { holdView, newHoldBody, previewView } from '#shared/schemas/requirements'
import { addHold } from '../../services/holds'

export default defineRoute({
  summary: 'Put a person on hold, or preview whom that would stop',
  ability: 'requirements.write',
  query: previewQuery,
  body: newHoldBody,
  answer: holdView.or(previewView),
  status: 201,
  previews: true,
}, ({ work, body, query }) => addHold(work, body, query))
