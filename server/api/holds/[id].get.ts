import { idParams } from '#shared/schemas/common'
import { holdView } from '#shared/schemas/requirements'
import { readHold } from '../../services/holds'

export default defineRoute({
  summary: 'One hold',
  ability: 'requirements.read',
  params: idParams,
  answer: holdView,
}, ({ work, params }) => readHold(work, params.id))
