import { assignmentView, newAssignmentBody } from '#shared/schemas/crews-and-sites'
import { addAssignment } from '../../services/assignments'

export default defineRoute({
  summary: 'Roster a person or a crew at a site',
  ability: 'sites.write',
  body: newAssignmentBody,
  answer: assignmentView,
  status: 201,
}, ({ work, body }) => addAssignment(work, body))
