import { talkParams, talkView } from '#shared/schemas/talk'
import { notFound } from '../../services/refusal'
import { toTalkView } from '../../services/talks'

export default defineRoute({
  summary: 'A talk to be read, in both languages',
  ability: 'briefing.read', params: talkParams, answer: talkView,
}, async ({ params, event }) => {
  const talk = (await readTalks(event)).get(params.slug)
  if (!talk) throw notFound('talk')
  return toTalkView(talk)
})
