import { idParams } from '#shared/schemas/common'
import { removeAssignment } from '../../services/assignments'

export default defineRoute({
  summary: 'Take an assignment away',
  ability: 'sites.write',
  params: idParams,
  status: 204,
}, ({ work, params }) => removeAssignment(work, params.id))
