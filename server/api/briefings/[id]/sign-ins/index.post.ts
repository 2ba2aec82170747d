import { idParams } from '#shared/schemas/common'
import { signInAnswer, signInSheetBody } from '#shared/schemas/briefing'
import { signInToBriefing } from '../../../../services/sheet-sign-ins'

export default definePublicRoute({
  summary: 'Sign in to a briefing, in any of its forms; a repeat of the key or the person answers 200 with the first',
  params: idParams, body: signInSheetBody, answer: signInAnswer, status: 201,
}, async ({ work, params, body, event }) => {
  const caller = { browserHash: getBrowserHash(event), address: addressOf(event) }
  const answer = await signInToBriefing(work, params.id, body, caller, await readTalks(event))
  if (answer.isRepeat) event.context.answerStatus = 200
  return answer
})
