import { idParams } from '#shared/schemas/common'
import { crewChanges, crewView } from '#shared/schemas/crews-and-sites'
import { changeCrew } from '../../../services/crews'

export default defineRoute({
  summary: 'Change a crew; duties replace all its usual slots',
  ability: 'sites.write',
  params: idParams,
  body: crewChanges,
  answer: crewView,
}, ({ work, params, body }) => changeCrew(work, params.id, body))
