import { renewalSuggestionsQuery, renewalSuggestionsView } from '#shared/schemas/renewals'
import { suggestRenewals } from '../../services/renewals'

export default defineRoute({
  summary: 'Whose cards end in the coming weeks, by type, with the latest day to book',
  ability: 'renewals.manage', query: renewalSuggestionsQuery, answer: renewalSuggestionsView,
}, ({ work, query }) => suggestRenewals(work, query))
