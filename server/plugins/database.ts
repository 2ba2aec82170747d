import { seedDemoCompany } from '~~/seeds/demo'
import { seedReference } from '~~/seeds/reference'
import { openDatabase } from '../data/database'
import { appState } from '../services/app-state'
import { ensureSetupToken } from '../services/setup'
import { toSettings } from '../services/settings'
import { readBanks } from '../utils/readBanks'

/** Opens and migrates the database at start; every request waits for it, and the process ends when it fails. */
export default defineNitroPlugin((nitro) => {
  const settings = toSettings(useRuntimeConfig())
  if (settings.clock.isSet) console.warn(`[pourwright] NUXT_CLOCK is set: the server's clock starts at ${settings.clock.now()}. For tests and demos only.`)

  // Everybody knows the demo's password: without a HOST it answers this machine only.
  if (settings.isDemo && !process.env.HOST && !process.env.NITRO_HOST) process.env.HOST = '127.0.0.1'

  const opening = openDatabase(settings.databasePath).then(async (db) => {
    await seedReference(db, settings.clock.now())
    if (settings.isDemo) await seedDemoCompany(db, settings, await readBanks())
    await ensureSetupToken(db, settings)
    appState.db = db
    appState.settings = settings
    return db
  })
  opening.catch((error: unknown) => {
    console.error('[pourwright] The database could not be opened:', error)
    process.exit(1)
  })

  nitro.hooks.hook('request', async (event) => {
    event.context.db = await opening
    event.context.settings = settings
    event.context.actor = null
  })
  nitro.hooks.hook('close', async () => {
    await (await opening).destroy()
  })
})
