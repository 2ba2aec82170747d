import { idParams } from '#shared/schemas/common'
import { admissionBody, admissionView } from '#shared/schemas/briefing'
import { admit } from '../../../services/admissions'

export default definePublicRoute({
  summary: 'Redeem a presence code for an admission of this browser',
  params: idParams, body: admissionBody, answer: admissionView, status: 201,
}, async ({ work, params, body, event }) => admit(work, params.id, body.code, requireBrowserHash(event), await readTalks(event)))
