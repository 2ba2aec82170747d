import { addDays, type CalendarDate } from '../../shared/domain/dates'
import { hashSecret } from '../../server/services/passwords'
import { randomToken } from '../../server/services/hashing'
import { type DemoContext, insertAll, instantAt, notAfterNow, recordedAt, weekdayOnOrBefore } from './context'
import { demoId } from './random'
import { type DemoPerson, roster } from './roster'

/** The demo's public secrets: they open nothing but the demo company. */
export const demoPassword = 'running-bond'
/** The new hire's PIN. */
export const demoPin = '739416'

const employers = { own: 'Cedar Hollow Walls', temp: 'Handcart Staffing', sub: 'Two Mesas Pumping' } as const
/** Whom the person works for. */
export const employerOf = (one: Pick<DemoPerson, 'employer'>) => employers[one.employer]

const opened = ['office', 'safety', 'super', 'foreman', 'installer']

/** The stable id of a person of the demo company. */
export const personId = (one: Pick<DemoPerson, 'badge'>) => demoId(`person ${one.badge}`)

/** The person's first day of work, always a weekday. */
export const hiredOn = (context: DemoContext, one: DemoPerson): CalendarDate => weekdayOnOrBefore(addDays(context.today, -one.hiredDaysAgo))

/** The first day on which the person is gone, or null. */
export const leftOn = (context: DemoContext, one: DemoPerson): CalendarDate | null =>
  (one.leftDaysAgo === undefined ? null : weekdayOnOrBefore(addDays(context.today, -one.leftDaysAgo)))

/** True when the person is on the roster on a date. */
export function worksOn(context: DemoContext, one: DemoPerson, date: CalendarDate): boolean {
  const left = leftOn(context, one)
  return hiredOn(context, one) <= date && (left === null || date < left)
}

function personRow(context: DemoContext, one: DemoPerson, index: number) {
  const createdAt = notAfterNow(context, recordedAt(context, hiredOn(context, one)))
  const area = one.crew?.startsWith('prairie') ? '308' : '970'
  return {
    id: personId(one), name: `${one.given} ${one.family}`, sortName: `${one.family}, ${one.given}`, badge: one.badge,
    email: one.mailbox ? `${one.mailbox}@cedarhollow.example` : null,
    phone: `(${area}) 555-01${String(index).padStart(2, '0')}`,
    role: one.role, language: one.language, readsWell: one.readsWell ?? null, employer: employerOf(one), employerKind: one.employer,
    trade: one.trade ?? null, hiredOn: hiredOn(context, one), leftOn: leftOn(context, one), crewId: null,
    createdAt, updatedAt: createdAt,
  }
}

/** Everybody on the roster, still without a crew. */
export async function seedPeople(context: DemoContext): Promise<void> {
  const rows = roster.map((one, index) => personRow(context, one, index))
  await insertAll(context.knex, 'people', rows)
  for (const row of rows) {
    const { id, name, badge, role, employer } = row
    context.audit.push({ at: row.createdAt, actorId: null, action: 'person.created', subject: { kind: 'person', id }, after: { name, badge, role, employer, hiredOn: row.hiredOn } })
    if (row.leftOn) context.audit.push({ at: notAfterNow(context, instantAt(row.leftOn, 16, 10)), actorId: demoId('person 1002'), action: 'person.changed', subject: { kind: 'person', id }, before: { leftOn: null }, after: { leftOn: row.leftOn } })
  }
}

/** Passwords and PINs hashed once each, before the transaction. People without a published one get a secret that nobody knows. */
export async function hashDemoSecrets(): Promise<{ password: string, pin: string, unknown: string }> {
  const [password, pin, unknown] = await Promise.all([hashSecret(demoPassword), hashSecret(demoPin), hashSecret(randomToken())])
  return { password, pin, unknown }
}

/** The ways in: the demo's own sign-ins, and everybody else's that they alone would know. */
export async function seedSignIns(context: DemoContext, hashes: Awaited<ReturnType<typeof hashDemoSecrets>>): Promise<void> {
  const rows = roster.filter(one => one.hasSignedIn && hiredOn(context, one) <= context.today).map((one) => {
    const setAt = notAfterNow(context, instantAt(hiredOn(context, one), 8, 5))
    const isOpened = one.mailbox !== undefined && opened.includes(one.mailbox)
    return {
      personId: personId(one), passwordHash: one.mailbox ? (isOpened ? hashes.password : hashes.unknown) : null,
      pinHash: one.badge === '2041' ? hashes.pin : hashes.unknown, firstUsedAt: setAt, setAt,
    }
  })
  await insertAll(context.knex, 'signInSecrets', rows)
}
