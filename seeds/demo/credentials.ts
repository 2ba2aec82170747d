import { addDays, addMonths, type CalendarDate } from '../../shared/domain/dates'
import type { QuizBank } from '../../shared/domain/quiz-bank'
import { expiryOf, type Validity } from '../../shared/domain/validity'
import { randomCode } from '../../server/services/hashing'
import { type DemoContext, insertAll, instantAt, notAfterNow, recordedAt, weekdayOnOrBefore } from './context'
import { type DemoTypes, planCredentials, type PlannedCredential } from './credential-plan'
import { seedLearning } from './learning'
import { taughtModules } from './learning-content'
import { personId } from './people'
import { createRandom, demoId } from './random'
import { type DemoPerson, personByKey } from './roster'
import { ahead, rejected, waitingForVerification, withdrawn } from './story'

const company = 'Cedar Hollow Walls'
const school = 'Stone Bridge Safety School'
const clinic = 'Quill Creek Work Clinic'
const manager = 'Marit Solheim'
const fromTheSchool = new Set(['first-aid-cpr', 'outreach-card', 'aerial-lift', 'scaffold-erector', 'excavation'])

const isTaught = (type: string) => taughtModules.some(module => module.slug === type)

interface Paper { number?: string, issuer: string, details?: Record<string, string> }

function paperOf(credential: PlannedCredential, types: DemoTypes): Paper {
  const { person, type, issuedOn } = credential
  const random = createRandom(`paper ${person.badge} ${type} ${issuedOn}`)
  if (isTaught(type)) return { issuer: company }
  if (types.get(type)?.module) return { issuer: company, details: { judgedBy: manager, judgedOn: issuedOn } }
  if (type === 'respirator-medical') return { issuer: clinic }
  if (type === 'respirator-fit') return { issuer: company, details: { evaluator: manager, equipment: random.pick(['Half mask, medium', 'Half mask, large', 'N95 cup, one size']) } }
  if (type === 'lift-truck') {
    const equipment = random.pick(['Telehandler, 8,000 lb', 'Telehandler, 10,000 lb', 'Rough-terrain forklift'])
    return { number: `LT-${random.between(1000, 9899)}`, issuer: company, details: { trainer: school, evaluator: 'Luther Askew', evaluatedOn: issuedOn, language: person.language, equipment } }
  }
  if (fromTheSchool.has(type)) return { number: `${type === 'outreach-card' ? 'OC' : 'SB'}-${random.between(20_000, 98_999)}`, issuer: school, details: { trainer: school, language: person.language } }
  return { issuer: company, details: { trainer: manager, language: person.language } }
}

function rowFor(context: DemoContext, types: DemoTypes, credential: PlannedCredential) {
  const { person, type, issuedOn, expiresOn } = credential
  const paper = paperOf(credential, types)
  const minutes = createRandom(`written ${person.badge} ${type} ${issuedOn}`).between(0, 400)
  const written = recordedAt(context, issuedOn)
  const at = notAfterNow(context, written.startsWith(issuedOn) ? instantAt(issuedOn, 8 + Math.floor(minutes / 60), minutes % 60) : written)
  const safety = personId(personByKey('solheim'))
  return {
    id: demoId(`credential ${person.badge} ${type} ${issuedOn} ${credential.siteId ?? ''}`), personId: personId(person), typeId: types.get(type)?.id,
    issuedOn, expiresOn, number: paper.number ?? null, issuer: paper.issuer, siteId: credential.siteId ?? null,
    details: paper.details ? JSON.stringify(paper.details) : null,
    verification: 'verified', verifiedBy: safety as string | null, verifiedAt: at as string | null, verificationNote: null as string | null,
    withdrawnOn: null as string | null, withdrawnBy: null as string | null, withdrawalReason: null as string | null,
    attemptId: null as string | null, signOffId: null as string | null, cardCode: randomCode(), createdBy: safety, createdAt: at,
  }
}

/** A credential as the table takes it, with its type's code and its person for the other parts of the seed. */
export type CredentialRow = ReturnType<typeof rowFor> & { code: string, person: DemoPerson }

async function loadTypes(context: DemoContext): Promise<DemoTypes> {
  const rows = await context.knex('credentialTypes').select('id', 'code', 'validityKind', 'months', 'anchor', 'module')
  return new Map(rows.map((row) => {
    const validity: Validity = row.validityKind === 'period' ? { kind: 'period', months: row.months, anchor: row.anchor } : { kind: row.validityKind }
    return [row.code, { id: row.id, validity, module: row.module }]
  }))
}

function outsideCard(context: DemoContext, types: DemoTypes, key: string, type: string, issuedOn: CalendarDate): CredentialRow {
  const person = personByKey(key)
  const validity = types.get(type)?.validity ?? { kind: 'never' }
  const expiresOn = expiryOf(validity, issuedOn, validity.kind === 'printed' ? addMonths(issuedOn, 24) : null)
  const row = rowFor(context, types, { person, type, issuedOn, expiresOn })
  const paper = { number: `SB-${createRandom(`card ${key}`).between(20_000, 98_999)}`, issuer: school, details: JSON.stringify({ trainer: school, language: person.language }) }
  return { ...row, ...paper, createdBy: row.personId, code: type, person }
}

/** The cards that need a manager's eye: not verified yet, refused, and entered ahead of the class. */
function unusualCards(context: DemoContext, types: DemoTypes): CredentialRow[] {
  const back = (days: number) => addDays(context.today, -days)
  const waiting = waitingForVerification.map(card => ({
    ...outsideCard(context, types, card.key, card.type, weekdayOnOrBefore(back(card.issuedDaysAgo))),
    verification: 'unverified', verifiedBy: null, verifiedAt: null, createdAt: instantAt(back(card.sentDaysAgo), 17, 42),
  }))
  const refused = {
    ...outsideCard(context, types, rejected.key, rejected.type, weekdayOnOrBefore(back(rejected.issuedDaysAgo))),
    verification: 'rejected', verificationNote: rejected.note, createdAt: instantAt(back(rejected.sentDaysAgo), 18, 5), verifiedAt: instantAt(back(rejected.sentDaysAgo - 1), 9, 12),
  }
  const booked = { ...outsideCard(context, types, ahead.key, ahead.type, addDays(context.today, ahead.inDays)), createdBy: personId(personByKey('solheim')), createdAt: instantAt(back(3), 11, 30), verifiedAt: instantAt(back(3), 11, 30) }
  return [...waiting, refused, booked]
}

function withWithdrawal(context: DemoContext, row: CredentialRow): CredentialRow {
  if (row.person.key !== withdrawn.key || row.code !== withdrawn.type) return row
  return { ...row, withdrawnOn: addDays(context.today, -withdrawn.daysAgo), withdrawnBy: personId(personByKey('solheim')), withdrawalReason: withdrawn.reason }
}

function auditCredential(context: DemoContext, row: CredentialRow): void {
  const subject = { kind: 'credential', id: row.id }
  const { personId: person, code: type, issuedOn, expiresOn } = row
  const safety = personId(personByKey('solheim'))
  context.audit.push({ at: row.createdAt, actorId: row.createdBy, action: row.signOffId ? 'credential.issued' : 'credential.added', subject, after: { personId: person, type, issuedOn, expiresOn } })
  if (row.verification === 'rejected') context.audit.push({ at: row.verifiedAt ?? row.createdAt, actorId: safety, action: 'credential.rejected', subject, after: { note: row.verificationNote } })
  if (row.withdrawnOn) context.audit.push({ at: instantAt(row.withdrawnOn, 15, 25), actorId: safety, action: 'credential.withdrawn', subject, after: { reason: row.withdrawalReason } })
}

/** Two years of credentials around today, with the quizzes and hands-on that led to those taught here. */
export async function seedCredentials(context: DemoContext, banks: readonly QuizBank[]): Promise<void> {
  const types = await loadTypes(context)
  const ordinary = planCredentials(context, types).map(one => withWithdrawal(context, { ...rowFor(context, types, one), code: one.type, person: one.person }))
  const rows = [...await seedLearning(context, banks, ordinary), ...unusualCards(context, types)]
  await insertAll(context.knex, 'credentials', rows.map(({ code: _code, person: _person, ...row }) => row))
  for (const row of rows) auditCredential(context, row)
}
