import { assignmentsQuery, assignmentsView } from '#shared/schemas/crews-and-sites'
import { readAssignments } from '../../services/assignments'

export default defineRoute({
  summary: 'Who is rostered where, by first day',
  ability: 'sites.read',
  query: assignmentsQuery,
  answer: assignmentsView,
}, ({ work, query }) => readAssignments(work, query))
