import { idParams } from '#shared/schemas/common'
import { typeView } from '#shared/schemas/requirements'
import { requireType } from '../../services/credential-types'

export default defineRoute({
  summary: 'One credential type, by id or code',
  ability: 'requirements.read',
  params: idParams,
  answer: typeView,
}, ({ work, params }) => requireType(work.db, params.id))
