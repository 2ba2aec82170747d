import { todayOfCompany } from '../services/today'
import { readSession } from '../services/sessions'

/** Who is asking: reads the session cookie on pages and API routes, not on files. */
export default defineEventHandler(async (event) => {
  const cookies = getHeader(event, 'cookie')
  if (!cookies?.includes('session=') || /^\/(_nuxt|_fonts|__nuxt)/.test(event.path)) return
  const { db, settings } = event.context
  const { actor, cookie } = await readSession(db, settings, cookies, await todayOfCompany(db, settings.clock.now()))
  event.context.actor = actor
  if (cookie) appendResponseHeader(event, 'set-cookie', cookie)
})
