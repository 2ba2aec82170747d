import { z } from 'zod'

export default definePublicRoute({
  summary: 'What every screen must say about this server',
  answer: z.object({ isDemo: z.boolean(), isClockSet: z.boolean() }),
}, ({ work: { company, settings } }) => ({ isDemo: company.isDemo, isClockSet: settings.clock.isSet }))
