import { clearanceQuery, clearanceView } from '#shared/schemas/clearance'
import { readClearance } from '../services/clearance'

export default defineRoute({
  summary: 'Who may do which duty on a date, until when, and what is missing',
  ability: 'clearance.read',
  query: clearanceQuery,
  answer: clearanceView,
}, ({ work, query }) => readClearance(work, query))
