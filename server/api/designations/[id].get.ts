import { idParams } from '#shared/schemas/common'
import { designationView } from '#shared/schemas/requirements'
import { readDesignation } from '../../services/designations'

export default defineRoute({
  summary: 'One naming',
  ability: 'requirements.read',
  params: idParams,
  answer: designationView,
}, ({ work, params }) => readDesignation(work, params.id))
