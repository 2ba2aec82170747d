import { endSession } from '../services/sessions'

export default definePublicRoute({ summary: 'Sign out', status: 204 }, async ({ work, event }) => {
  appendResponseHeader(event, 'set-cookie', await endSession(work.db, work.settings, getHeader(event, 'cookie') ?? ''))
})
