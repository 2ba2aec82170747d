import { idParams } from '#shared/schemas/common'
import { briefingView, closingBody } from '#shared/schemas/briefing'
import { closeOwnBriefing, viewBriefing } from '../../../services/briefings'

export default defineRoute({
  summary: 'End the talk; who signs after it is marked late',
  ability: 'briefing.run', params: idParams, body: closingBody, answer: briefingView,
}, async ({ work, params, body, event }) => {
  await closeOwnBriefing(work, params.id, body.closedAt)
  return viewBriefing(work, params.id, await readTalks(event))
})
