import { talksQuery, talksView } from '#shared/schemas/talk'
import { toListItem } from '../../services/talks'

export default defineRoute({
  summary: 'Every talk, in one language',
  ability: 'briefing.read', query: talksQuery, answer: talksView,
}, async ({ work, query, event }) => ({ items: [...(await readTalks(event)).values()].map(talk => toListItem(talk, query.language ?? work.actor.language)) }))
