import { z } from 'zod'
import { id } from '#shared/schemas/common'
import { undoSignIn } from '../../../../services/sheet-sign-ins'

export default defineRoute({
  summary: 'Take a sign-in off the list before the seal; a trace stays',
  ability: 'briefing.run', params: z.strictObject({ id, signIn: id }), status: 204,
}, ({ work, params }) => undoSignIn(work, params.id, params.signIn))
