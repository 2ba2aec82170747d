import { idParams } from '#shared/schemas/common'
import { joinLinkView } from '#shared/schemas/links'
import { resetPin } from '../../../services/join-links'

export default defineRoute({
  summary: 'End somebody\'s PIN and make the link with which they set a new one',
  ability: 'pin.reset',
  params: idParams,
  answer: joinLinkView,
  status: 201,
}, ({ work, params, event }) => resetPin(work, params.id, originOf(event)))
