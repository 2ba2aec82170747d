import { z } from 'zod'
import { version } from '../../package.json'

export default definePublicRoute({
  summary: 'Is it up, and does the database answer',
  answer: z.object({ ok: z.boolean(), version: z.string(), database: z.string() }),
}, async ({ work }) => {
  await work.db.raw('select 1')
  return { ok: true, version, database: 'ok' }
})
