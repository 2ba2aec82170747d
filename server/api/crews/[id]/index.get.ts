import { idParams } from '#shared/schemas/common'
import { crewView } from '#shared/schemas/crews-and-sites'
import { readCrew } from '../../../services/crews'

export default defineRoute({
  summary: 'One crew',
  ability: 'sites.read',
  params: idParams,
  answer: crewView,
}, ({ work, params }) => readCrew(work, params.id))
