import { idParams } from '#shared/schemas/common'
import { addendumBody, addendumView } from '#shared/schemas/briefing'
import { addAddendum } from '../../../services/addenda'

export default defineRoute({
  summary: 'Add a correction to a sealed sheet, in the same chain',
  ability: 'briefing.run', params: idParams, body: addendumBody, answer: addendumView, status: 201,
}, ({ work, params, body }) => addAddendum(work, params.id, body.text))
