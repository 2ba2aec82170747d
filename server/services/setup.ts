import type { Db } from '../data/database'
import { randomCode, isSameSecret } from './hashing'
import type { Settings } from './settings'

let printedToken = ''

/** While the database has no people, prints the one-time token that the set-up page asks for. */
export async function ensureSetupToken(db: Db, settings: Settings): Promise<void> {
  if (await db('people').first('id')) return
  printedToken = settings.setupToken || randomCode(12)
  console.log(`[pourwright] This database is empty. Open /setup and type this token: ${printedToken}`)
}

/** True when `token` is the one that this server printed at start. */
export const isSetupToken = (token: string) => printedToken !== '' && isSameSecret(token.trim().toUpperCase(), printedToken.toUpperCase())
