import { previewQuery } from '#shared/schemas/crews-and-sites'
import { designationView, newDesignationBody, previewView } from '#shared/schemas/requirements'
import { addDesignation } from '../../services/designations'

export default defineRoute({
  summary: 'Name a person for a subject, or preview what that would do',
  ability: 'requirements.write',
  query: previewQuery,
  body: newDesignationBody,
  answer: designationView.or(previewView),
  status: 201,
  previews: true,
}, ({ work, body, query }) => addDesignation(work, body, query))
