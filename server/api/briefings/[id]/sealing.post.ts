import { idParams } from '#shared/schemas/common'
import { sealingBody, sealView } from '#shared/schemas/briefing'
import { sealOwnBriefing } from '../../../services/sealing'

export default defineRoute({
  summary: 'Seal the sheet; nothing is edited after that',
  ability: 'briefing.run', params: idParams, body: sealingBody, answer: sealView,
}, ({ work, params, event }) => sealOwnBriefing(work, params.id, originOf(event)))
