import { joinView, tokenParams } from '#shared/schemas/links'
import { readJoinLink } from '../../services/join-links'

export default definePublicRoute({
  summary: 'Whom a join link greets, and whether they choose a PIN or a password',
  params: tokenParams,
  answer: joinView,
}, ({ work, params }) => readJoinLink({ ...work, actor: null }, params.token))
