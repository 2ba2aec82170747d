import { addDays, addMinutes, dateInZone, type CalendarDate } from '../../shared/domain/dates'
import type { QuizBank } from '../../shared/domain/quiz-bank'
import { MINUTES_PER_HANDS_ON_STEP, quizMinutes } from '../../shared/domain/training-minutes'
import { attemptRow } from './attempts'
import { companyZone, type DemoContext, insertAll, instantAt, weekdayOnOrBefore } from './context'
import type { CredentialRow } from './credentials'
import { taughtModule, taughtModules } from './learning-content'
import { hiredOn, personId } from './people'
import { createRandom, demoId, type Random } from './random'
import { type DemoPerson, personByKey } from './roster'
import { assessorsNamedDaysAgo, onTheWay, reading } from './story'

interface Past {
  reads: ReadRow[]
  attempts: ReturnType<typeof attemptRow>[]
  signOffs: { id: string, personId: string, module: string, steps: string, signedAt: string }[]
  requests: object[]
}

function assessorFor(context: DemoContext, person: DemoPerson, date: CalendarDate): DemoPerson {
  const key = person.crew?.startsWith('prairie') ? 'tran' : person.crew === 'walls-b' ? 'kowalczyk' : 'zamora'
  const isNamed = date > addDays(context.today, -assessorsNamedDaysAgo)
  return personByKey(isNamed && person.role !== 'foreman' && person.role !== 'superintendent' ? key : 'solheim')
}

interface ReadRow { personId: string, module: string, lesson: string, language: string, firstReadAt: string, lastReadAt: string }
const readRow = (person: DemoPerson, module: string, lesson: string, at: string): ReadRow =>
  ({ personId: personId(person), module, lesson, language: person.language, firstReadAt: at, lastReadAt: at })

function readsOf(person: DemoPerson, module: string, day: CalendarDate, random: Random, most = Infinity): ReadRow[] {
  const begun = instantAt(day, 7, random.between(5, 40))
  return taughtModule(module).lessons.slice(0, most).map((lesson, index) => readRow(person, module, lesson, addMinutes(begun, index * 8)))
}

/** Lessons, quiz (at times failed first) and hands-on that led to a credential; the quiz some working days earlier. */
function leadUp(context: DemoContext, bank: QuizBank, row: CredentialRow, past: Past): CredentialRow {
  const { person, code: module, issuedOn } = row
  const random = createRandom(`learning ${person.badge} ${module} ${issuedOn}`)
  const hired = hiredOn(context, person)
  const back = (days: number) => [weekdayOnOrBefore(addDays(issuedOn, -days)), hired].sort().at(-1) ?? hired
  const quizDay = back(random.between(1, 5))
  const attempt = attemptRow({ person, bank, startedAt: instantAt(quizDay, 12, random.between(2, 25)), isToPass: true })
  const failed = random.chance(0.25) ? [attemptRow({ person, bank, startedAt: instantAt(quizDay, 9, random.between(5, 50)), isToPass: false })] : []
  const assessor = assessorFor(context, person, issuedOn)
  const signedAt = instantAt(issuedOn, 14, random.between(0, 55))
  const signOff = {
    id: demoId(`sign-off ${person.badge} ${module} ${issuedOn}`), personId: personId(person), assessorId: personId(assessor), module,
    steps: JSON.stringify(taughtModule(module).checklist.map(id => ({ id, ok: true }))), mark: JSON.stringify({ kind: 'typed', text: `${assessor.given} ${assessor.family}` }), passed: true, signedAt,
  }
  past.reads.push(...readsOf(person, module, quizDay, random))
  past.attempts.push(...failed, attempt)
  past.signOffs.push(signOff)
  past.requests.push({ id: demoId(`request ${signOff.id}`), personId: personId(person), module, requestedAt: addMinutes(attempt.submittedAt, 2), closedAt: signedAt })
  context.audit.push({ at: signedAt, actorId: signOff.assessorId, action: 'signOff.given', subject: { kind: 'signOff', id: signOff.id }, after: { personId: signOff.personId, module, passed: true } })
  return { ...row, attemptId: attempt.id, signOffId: signOff.id, verifiedBy: signOff.assessorId, verifiedAt: signedAt, createdBy: signOff.assessorId, createdAt: signedAt }
}

/** Those who are in the middle of a module today. */
function seedLearnersOnTheWay(context: DemoContext, banks: ReadonlyMap<string, QuizBank>, past: Past): void {
  for (const one of onTheWay) {
    const person = personByKey(one.key)
    const random = createRandom(`on the way ${one.key}`)
    const day = weekdayOnOrBefore(addDays(context.today, -one.quizDaysAgo))
    const bank = banks.get(one.module)
    if (!bank) continue
    const attempt = attemptRow({ person, bank, startedAt: instantAt(day, 12, random.between(2, 20)), isToPass: one.passed })
    past.reads.push(...readsOf(person, one.module, day, random))
    past.attempts.push(attempt)
    if (one.asksForHandsOn) past.requests.push({ id: demoId(`request ${attempt.id}`), personId: personId(person), module: one.module, requestedAt: addMinutes(attempt.submittedAt, 3), closedAt: null })
  }
  past.reads.push(...readsOf(personByKey(reading.key), reading.module, weekdayOnOrBefore(addDays(context.today, -reading.daysAgo)), createRandom('reading'), reading.lessons))
}

/** The minutes that this past counts, as the product counts them. */
function minutesOf({ reads, attempts, signOffs }: Past): object[] {
  const row = (id: string, at: string, rest: object) => ({ id: demoId(`minutes ${id}`), lesson: null, doneOn: dateInZone(at, companyZone), doneAt: at, ...rest })
  const lessonMinutes = (module: string, slug: string) => taughtModule(module).minutes[taughtModule(module).lessons.indexOf(slug)] ?? 0
  const readings = new Map(reads.map(read => [`${read.personId} ${read.module} ${read.lesson}`, read]))
  return [
    ...[...readings].map(([key, { personId, module, lesson, firstReadAt }]) => row(key, firstReadAt, { personId, module, kind: 'lesson', lesson, minutes: lessonMinutes(module, lesson) })),
    ...attempts.map(({ id, personId, module, startedAt, submittedAt }) => row(id, submittedAt, { personId, module, kind: 'quiz', minutes: quizMinutes(startedAt, submittedAt, 60) })),
    ...signOffs.map(({ id, personId, module, steps, signedAt }) => row(id, signedAt, { personId, module, kind: 'handsOn', minutes: (JSON.parse(steps) as unknown[]).length * MINUTES_PER_HANDS_ON_STEP })),
  ]
}

/**
 * What people read, tried and were signed off on. Answers the credentials with what they were issued from. A module
 * whose bank is not given has no past.
 */
export async function seedLearning(context: DemoContext, banks: readonly QuizBank[], rows: readonly CredentialRow[]): Promise<CredentialRow[]> {
  const past: Past = { reads: [], attempts: [], signOffs: [], requests: [] }
  const bankOf = new Map(banks.filter(bank => taughtModules.some(module => module.slug === bank.module)).map(bank => [bank.module, bank]))
  const issued = rows.map((row) => {
    const bank = bankOf.get(row.code)
    return bank ? leadUp(context, bank, row, past) : row
  })
  seedLearnersOnTheWay(context, bankOf, past)
  await insertAll(context.knex, 'lessonReads', past.reads)
  await insertAll(context.knex, 'attempts', past.attempts)
  await insertAll(context.knex, 'signOffs', past.signOffs)
  await insertAll(context.knex, 'signOffRequests', past.requests)
  await insertAll(context.knex, 'trainingMinutes', minutesOf(past))
  return issued
}
