import { idParams } from '#shared/schemas/common'
import { assignmentView } from '#shared/schemas/crews-and-sites'
import { readAssignment } from '../../services/assignments'

export default defineRoute({
  summary: 'One assignment',
  ability: 'sites.read',
  params: idParams,
  answer: assignmentView,
}, ({ work, params }) => readAssignment(work, params.id))
