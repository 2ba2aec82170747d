import { randomUUID } from 'node:crypto'
import { dateInZone } from '#shared/domain/dates'
import { sortNameOf } from '#shared/domain/names'
import type { SetupBody } from '#shared/schemas/setup'
import { appendAudit } from '../data/audit'
import { insertCompany } from '../data/company'
import type { Db } from '../data/database'
import { hasPeople, insertFirstAdmin } from '../data/setup'
import { randomCode, isSameSecret } from './hashing'
import { hashSecret } from './passwords'
import { Refusal } from './refusal'
import { assertGoodPassword } from './secret-quality'
import type { Settings } from './settings'
import { enter } from './sign-in'
import { countTry } from './slow-down'
import type { Work } from './work'

let printedToken = ''

/** While the database has no people, prints the one-time token that the set-up page asks for. */
export async function ensureSetupToken(db: Db, settings: Settings): Promise<void> {
  if (await hasPeople(db)) return
  printedToken = settings.setupToken || randomCode(12)
  console.log(`[pourwright] This database is empty. Open /setup and type this token: ${printedToken}`)
}

/** True when `token` is the one that this server printed at start. */
export const isSetupToken = (token: string) => printedToken !== '' && isSameSecret(token.trim().toUpperCase(), printedToken.toUpperCase())

/** True while there is nobody who could sign in. */
export const isSetupNeeded = async (db: Db): Promise<boolean> => !await hasPeople(db)

const alreadySetUp = () => new Refusal('conflict', 'alreadySetUp', { message: 'This company is set up; sign in instead' })

/**
 * Names the company, makes its first admin and signs them in. Only with the token that this server printed, and only
 * while the database has no people (409 `alreadySetUp` afterwards).
 */
export async function setUp(work: Work<null>, { token, company, admin }: SetupBody, address: string) {
  const { db, now } = work
  if (!await isSetupNeeded(db)) throw alreadySetUp()
  if (!isSetupToken(token)) {
    await countTry(db, [{ name: `setup:${address}`, free: 5 }], now)
    throw new Refusal('forbidden', 'wrongToken', { message: 'That is not the token that the server printed at start', fields: { token: 'is wrong' } })
  }
  await assertGoodPassword(admin.password, [company.name, admin.name, admin.email])
  const passwordHash = await hashSecret(admin.password)
  const language = company.language ?? 'en'
  const person = { id: randomUUID(), name: admin.name, role: 'admin' as const, language }
  await db.transaction(async (trx) => {
    if (await hasPeople(trx)) throw alreadySetUp()
    await insertCompany(trx, { name: company.name, timeZone: company.timeZone, language, isDemo: false }, now)
    await insertFirstAdmin(trx, { ...person, sortName: sortNameOf(admin.name), email: admin.email, employer: company.name, hiredOn: dateInZone(now, company.timeZone), passwordHash, now })
    await appendAudit(trx, { at: now, actorId: person.id, action: 'company.setUp', subject: { kind: 'company', id: '1' }, after: { name: company.name, timeZone: company.timeZone, language } })
    await appendAudit(trx, { at: now, actorId: person.id, action: 'person.added', subject: { kind: 'person', id: person.id }, after: { name: person.name, role: person.role } })
  })
  printedToken = ''
  return enter(work, person, 'password')
}
