import { crewView, newCrewBody } from '#shared/schemas/crews-and-sites'
import { addCrew } from '../../services/crews'

export default defineRoute({
  summary: 'Add a crew',
  ability: 'sites.write',
  body: newCrewBody,
  answer: crewView,
  status: 201,
}, ({ work, body }) => addCrew(work, body))
