import { resetView, tokenParams } from '#shared/schemas/links'
import { readResetLink } from '../../services/password-resets'

export default definePublicRoute({
  summary: 'Is a mailed reset link still good, and for which address',
  params: tokenParams,
  answer: resetView,
}, ({ work, params }) => readResetLink({ ...work, actor: null }, params.token))
