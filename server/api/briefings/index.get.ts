import { listOf } from '#shared/schemas/common'
import { briefingListItem, briefingsQuery } from '#shared/schemas/briefing'
import { listOwnBriefings } from '../../services/briefings'

export default defineRoute({
  summary: 'Briefings of my sites, the latest first',
  ability: 'briefing.read', query: briefingsQuery, answer: listOf(briefingListItem),
}, ({ work, query }) => listOwnBriefings(work, query))
