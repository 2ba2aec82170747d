import { idParams } from '#shared/schemas/common'
import { assignmentChanges, assignmentView } from '#shared/schemas/crews-and-sites'
import { changeAssignment } from '../../services/assignments'

export default defineRoute({
  summary: 'Move an assignment to another site or other days',
  ability: 'sites.write',
  params: idParams,
  body: assignmentChanges,
  answer: assignmentView,
}, ({ work, params, body }) => changeAssignment(work, params.id, body))
