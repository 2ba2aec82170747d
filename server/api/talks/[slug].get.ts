import { talkParams, talkQuery, talkView } from '#shared/schemas/talk'
import { findTalkAsRead } from '../../services/company-texts'
import { notFound } from '../../services/refusal'
import { toTalkView } from '../../services/talks'

export default defineRoute({
  summary: 'A talk to be read, in both languages',
  ability: 'briefing.read', params: talkParams, query: talkQuery, answer: talkView,
}, async ({ work, params, query, event }) => {
  const now = (await readTalks(event)).get(params.slug)
  const isNow = !query.hash || now?.hash.en === query.hash || now?.hash.es === query.hash
  const talk = isNow ? now : await findTalkAsRead(work.db, params.slug, query.hash!)
  if (!talk) throw notFound('talk')
  return toTalkView(talk)
})
