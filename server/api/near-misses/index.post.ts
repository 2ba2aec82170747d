import { nearMissBody, nearMissView } from '#shared/schemas/near-misses'
import { reportNearMiss } from '../../services/near-misses'

export default defineRoute({
  summary: 'Report a near miss or an incident, anonymously if wished',
  ability: 'nearMiss.report', body: nearMissBody, answer: nearMissView, status: 201,
}, ({ work, body }) => reportNearMiss(work, body))
