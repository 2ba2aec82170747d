import { crewingBody, crewingView } from '#shared/schemas/crewing'
import { crewDay } from '../../services/crewing'

export default defineRoute({
  summary: 'Whether a day\'s slots can be filled, why not, and the shortest fix',
  ability: 'clearance.read', body: crewingBody, answer: crewingView,
}, async ({ work, body, event }) => crewDay(work, await getTeaching(event), body))
