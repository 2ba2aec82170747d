import { idParams } from '#shared/schemas/common'
import { joinLinkView } from '#shared/schemas/links'
import { makeJoinLink } from '../../../services/join-links'

export default defineRoute({
  summary: 'Make a link, also as a QR picture, for somebody\'s first sign-in',
  ability: 'people.invite',
  params: idParams,
  answer: joinLinkView,
  status: 201,
}, ({ work, params, event }) => makeJoinLink(work, params.id, originOf(event)))
