import { suggestionsQuery, suggestionsView } from '#shared/schemas/talk'
import { suggestForSite } from '../../services/talk-suggestions'

export default defineRoute({
  summary: 'Talks for a site\'s morning, best first, each with its reasons',
  ability: 'briefing.run', query: suggestionsQuery, answer: suggestionsView,
}, async ({ work, query, event }) => ({ items: await suggestForSite(work, query, await readTalks(event)) }))
