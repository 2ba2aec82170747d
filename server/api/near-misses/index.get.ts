import { nearMissList } from '#shared/schemas/near-misses'
import { readNearMisses } from '../../services/near-misses'

export default defineRoute({
  summary: 'One\'s own reports with what was done about them; the safety manager sees all',
  ability: 'nearMiss.report', answer: nearMissList,
}, ({ work }) => readNearMisses(work))
