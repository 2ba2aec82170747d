import { z } from 'zod'
import { idParams } from '#shared/schemas/common'
import { talkView } from '#shared/schemas/talk'
import { readAdmittedTalk } from '../../../services/admissions'

export default definePublicRoute({
  summary: 'The talk\'s text for a browser that was admitted',
  params: idParams, answer: talkView.extend({ state: z.string() }),
}, async ({ work, params, event }) => readAdmittedTalk(work, params.id, getBrowserHash(event), await readTalks(event)))
