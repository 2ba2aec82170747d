import { lookAheadQuery, lookAheadView } from '#shared/schemas/look-ahead'
import { readLookAhead } from '../services/look-ahead'

export default defineRoute({
  summary: 'The coming weeks: whose cards end, which crew runs short when, and the load on classes',
  ability: 'clearance.read', query: lookAheadQuery, answer: lookAheadView,
}, ({ work, query }) => readLookAhead(work, query))
