import { idParams } from '#shared/schemas/common'
import { presenceView } from '#shared/schemas/briefing'
import { showPresence } from '../../../services/live-code'

export default defineRoute({
  summary: 'The presence code that the live screen shows now',
  ability: 'briefing.run', params: idParams, answer: presenceView,
}, ({ work, params, event }) => showPresence(work, params.id, originOf(event)))
