import { idParams } from '#shared/schemas/common'
import { todayQuery, todayView } from '#shared/schemas/today'
import { viewToday } from '../../../services/site-today'

export default defineRoute({
  summary: 'A site\'s morning: who is expected and cleared, the open briefing, talks',
  ability: 'clearance.read', params: idParams, query: todayQuery, answer: todayView,
}, async ({ work, params, query, event }) => viewToday(work, params.id, query, await readTalks(event)))
