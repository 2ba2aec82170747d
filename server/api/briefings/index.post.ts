import { briefingView, openBriefingBody } from '#shared/schemas/briefing'
import { openBriefing } from '../../services/briefings'

export default defineRoute({
  summary: 'Open a briefing; a client-made id makes a repeat harmless',
  ability: 'briefing.run', body: openBriefingBody, answer: briefingView, status: 201,
}, async ({ work, body, event }) => {
  const { isRepeat, ...view } = await openBriefing(work, body, await readTalks(event))
  if (isRepeat) event.context.answerStatus = 200
  return view
})
