import { idParams } from '#shared/schemas/common'
import { briefingView } from '#shared/schemas/briefing'
import { viewBriefing } from '../../../services/briefings'

export default defineRoute({
  summary: 'A briefing: all of it for who leads the site, my own line for everybody else',
  ability: 'briefing.read', params: idParams, answer: briefingView,
}, async ({ work, params, event }) => viewBriefing(work, params.id, await readTalks(event)))
