import { siteByCodeParams, siteLandingView } from '#shared/schemas/crews-and-sites'
import { readSiteLanding } from '../../../services/sites'

export default definePublicRoute({
  summary: 'The poster\'s page: a site\'s name, and whether a briefing takes sign-ins there now',
  params: siteByCodeParams,
  answer: siteLandingView,
}, ({ work, params }) => readSiteLanding({ ...work, actor: null }, params.code))
