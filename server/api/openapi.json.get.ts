import { routeList } from '#route-list'
import { describeRoutes } from '../services/openapi'

export default definePublicRoute({ summary: 'This description' }, () => describeRoutes(routeList))
