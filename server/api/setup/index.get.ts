import { setupView } from '#shared/schemas/setup'
import { isSetupNeeded } from '../../services/setup'

export default definePublicRoute({
  summary: 'Does this database still need its first company and admin',
  answer: setupView,
}, async ({ work }) => ({ needed: await isSetupNeeded(work.db) }))
