import { randomUUID } from 'node:crypto'
import { addDays, compareInstants, dateInZone } from '#shared/domain/dates'
import type { Actor } from '#shared/access/abilities'
import type { ByLeadBody, MakeUpBody, OwnPhoneBody, SignInAnswer, SignInSheetBody, Visitor } from '#shared/schemas/briefing'
import type { Mark } from '#shared/schemas/mark'
import { isEmployedOn } from '#shared/domain/clearance'
import { type Admission, getAdmission, useAdmission } from '../data/admissions'
import { appendAudit } from '../data/audit'
import type { BriefingWithSite } from '../data/briefings'
import type { Db } from '../data/database'
import { type CheckAnswer, countSignIns, getSigner, getSignIn, getSignInByKey, getSignInOfPerson, insertSignIn, type NewSignIn, removeSignIn, type SignIn } from '../data/sign-ins'
import { appendSignInAddendum } from './addenda'
import { assertNotSealed, requireBriefing, requireOwnBriefing } from './briefing-access'
import { capturedTime, toLine } from './briefings'
import { tellBriefing } from './briefing-events'
import { sha256 } from './hashing'
import { badField, notFound, Refusal } from './refusal'
import { expectedPeople } from './roster'
import { provePerson } from './sign-in'
import type { Talks } from './talks'
import type { Work } from './work'

/** Where a request came from: its browser (for admissions) and address (for slowing PIN guesses). */
export interface Caller { browserHash: string | undefined, address: string }
type AnyWork = Work<Actor | null>
type Who = { personId: string, language: 'en' | 'es' } | { visitor: Visitor }

const refuseSealed = () => new Refusal('conflict', 'sealed', { message: 'This briefing is sealed. Nothing can be changed now.' })

async function answerWith(db: Db, signIn: SignIn, extra: Partial<SignInAnswer> & { isRepeat: boolean }): Promise<SignInAnswer> {
  return { ...toLine(signIn), count: await countSignIns(db, signIn.briefingId), ...extra }
}

/** The first answer to this key, or null when it is new. 409 when the key belongs elsewhere or its line was taken off. */
async function findRepeat(db: Db, briefingId: string, key: string): Promise<SignIn | null> {
  const known = await getSignInByKey(db, key)
  if (!known) return null
  if (known.briefingId !== briefingId) throw new Refusal('conflict', 'keyTaken', { message: 'This key was used for another briefing', fields: { key: 'was used for another briefing' } })
  if (known.removedAt) throw new Refusal('conflict', 'undone', { message: 'This sign-in was taken off the list' })
  return known
}

/** A company may ask for a signature; a witness stands in for one. The paper itself carries its own. */
function assertMarkFits(work: AnyWork, method: SignInSheetBody['method'], mark: Mark, reason?: string): void {
  if (work.company.markAsked === 'signature' && mark.kind === 'tap' && method !== 'paper') throw badField('mark', 'a signature is asked for', 'signatureNeeded')
  if (reason === 'cannotRead' && mark.kind !== 'witnessed') throw badField('mark', 'needs a witness', 'witnessNeeded')
}

function gradeCheck(talks: Talks, briefing: BriefingWithSite, option: string | undefined): { answer: CheckAnswer, check: NonNullable<SignInAnswer['check']> } | null {
  if (option === undefined) return null
  const check = talks.get(briefing.talk)?.check
  if (!check?.options.some(row => row.id === option)) throw badField('answer', 'is none of the options')
  const isRight = option === check.right
  return { answer: { option, isRight }, check: { isRight, right: check.right, explain: check.explain } }
}

const isAfterClosing = (briefing: BriefingWithSite, signedAt: string) => briefing.closedAt !== null && compareInstants(signedAt, briefing.closedAt) > 0

/**
 * Writes a sign-in inside one transaction that looks again at everything two requests could race for: the seal, the
 * key, the person, the admission. A person who stands on the list already gets their first line back.
 */
async function record(work: AnyWork, row: NewSignIn, options: { admission?: Admission, mayBeSealed?: boolean } = {}): Promise<{ signIn: SignIn, isRepeat: boolean, addendumId?: string }> {
  const { db, settings, now, actor } = work
  return db.transaction(async (trx) => {
    const again = await findRepeat(trx, row.briefingId, row.key) ?? (row.personId ? await getSignInOfPerson(trx, row.briefingId, row.personId) : null)
    if (again) return { signIn: again, isRepeat: true }
    const briefing = await requireBriefing(trx, row.briefingId)
    if (briefing.sealedAt && !options.mayBeSealed) throw refuseSealed()
    if (options.admission) {
      const admission = await getAdmission(trx, options.admission.tokenHash)
      if (admission?.signInId) throw new Refusal('conflict', 'admissionUsed', { message: 'This admission was used. The next person scans the code again.' })
      await useAdmission(trx, options.admission.tokenHash, row.id)
    }
    await insertSignIn(trx, { ...row, late: row.late || (row.method !== 'makeUp' && isAfterClosing(briefing, row.signedAt)) })
    const signIn = (await getSignIn(trx, row.briefingId, row.id))!
    if (!briefing.sealedAt) return { signIn, isRepeat: false }
    const { hash } = await appendSignInAddendum(trx, { briefing, signIn, by: actor!, now, settings })
    return { signIn, isRepeat: false, addendumId: hash }
  })
}

function toRow(briefing: BriefingWithSite, who: Who, given: Pick<NewSignIn, 'key' | 'method' | 'mark' | 'language' | 'signedAt'> & Partial<NewSignIn>, now: string): NewSignIn {
  return {
    id: randomUUID(), briefingId: briefing.id, personId: 'personId' in who ? who.personId : null, visitor: 'visitor' in who ? who.visitor : null,
    reason: null, late: false, enteredBy: null, answer: null, explainedBy: null, withoutSignal: false, presenceStep: null, createdAt: now, ...given,
  }
}

async function finish(work: AnyWork, made: Awaited<ReturnType<typeof record>>, check?: SignInAnswer['check']): Promise<SignInAnswer> {
  const answer = await answerWith(work.db, made.signIn, { isRepeat: made.isRepeat, ...(made.addendumId && { addendumId: made.addendumId }), ...(check && !made.isRepeat && { check }) })
  if (!made.isRepeat) tellBriefing(made.signIn.briefingId, { kind: 'signIn', data: { id: answer.id, name: answer.name, count: answer.count, method: answer.method } })
  return answer
}

/** Who signs on their own phone: a visitor, a badge with its PIN, or the session; exactly one of them. */
async function whoSigns(work: AnyWork, body: OwnPhoneBody, address: string): Promise<Who> {
  const { visitor, badge, pin } = body
  if (visitor && (badge || pin || body.session)) throw badField('visitor', 'a visitor has no badge and no session')
  if (visitor) return { visitor }
  if (badge || pin) {
    if (!badge || !pin) throw badField(badge ? 'pin' : 'badge', 'is needed')
    const person = await provePerson(work, { badge, pin }, address)
    return { personId: person.id, language: person.language }
  }
  if (!work.actor) throw new Refusal('notSignedIn', 'notSignedIn', { message: 'Say who you are: badge and PIN, or visitor' })
  return { personId: work.actor.personId, language: work.actor.language }
}

async function signInOnOwnPhone(work: AnyWork, briefingId: string, body: OwnPhoneBody, caller: Caller, talks: Talks): Promise<SignInAnswer> {
  const briefing = await requireBriefing(work.db, briefingId)
  const repeat = await findRepeat(work.db, briefingId, body.key)
  if (repeat) return answerWith(work.db, repeat, { isRepeat: true })
  assertNotSealed(briefing, work.now)
  const admission = await getAdmission(work.db, sha256(body.admission))
  if (!admission || admission.briefingId !== briefingId || admission.browserHash !== caller.browserHash) throw badField('admission', 'scan the code again', 'badAdmission')
  assertMarkFits(work, body.method, body.mark)
  const graded = gradeCheck(talks, briefing, body.answer)
  const who = await whoSigns(work, body, caller.address)
  const made = await record(work, toRow(briefing, who, {
    key: body.key, method: body.method, mark: body.mark, language: body.language, signedAt: work.now, presenceStep: admission.step,
    answer: graded?.answer ?? null, explainedBy: graded && !graded.answer.isRight ? briefing.runBy : null,
  }, work.now), { admission })
  return finish(work, made, graded?.check)
}

/** The person or visitor that a lead enters; 422 when it is neither or both, or nobody employed that day. */
async function whoIsEntered(work: Work, briefing: BriefingWithSite, body: ByLeadBody): Promise<Who> {
  if (!body.personId === !body.visitor) throw badField('personId', 'needs a person or a visitor')
  if (body.visitor) return { visitor: body.visitor }
  const person = await getSigner(work.db, body.personId!)
  // The day before their first day is taken too: people come to be shown round.
  if (!person || !(isEmployedOn(person, briefing.localDate) || isEmployedOn(person, addDays(briefing.localDate, 1)))) throw badField('personId', 'nobody of the company has this id')
  return { personId: person.id, language: person.language }
}

function signedAtOf(work: Work, briefing: BriefingWithSite, body: ByLeadBody): string {
  if (body.signedAt && !body.withoutSignal && body.method !== 'paper') throw badField('signedAt', 'only without signal, or from paper')
  const signedAt = capturedTime('signedAt', body.signedAt, work.now)
  if (compareInstants(signedAt, briefing.openedAt) < 0) throw badField('signedAt', 'lies before the briefing')
  return signedAt
}

/** After the seal only what was taken without signal before it still comes in, as an addendum. */
function assertMayEnter(briefing: BriefingWithSite, body: ByLeadBody, signedAt: string, now: string): void {
  const wasTakenWithoutSignal = body.withoutSignal === true && body.signedAt !== undefined
  if (!wasTakenWithoutSignal) return assertNotSealed(briefing, now)
  const isInTime = briefing.sealedAt ? compareInstants(signedAt, briefing.sealedAt) < 0 : dateInZone(signedAt, briefing.site.timeZone) === briefing.localDate
  if (!isInTime) throw refuseSealed()
}

async function signInByLead(work: Work, briefingId: string, body: ByLeadBody): Promise<SignInAnswer> {
  const briefing = await requireOwnBriefing(work, briefingId)
  const repeat = await findRepeat(work.db, briefingId, body.key)
  if (repeat) return answerWith(work.db, repeat, { isRepeat: true })
  const signedAt = signedAtOf(work, briefing, body)
  assertMayEnter(briefing, body, signedAt, work.now)
  if (body.method === 'addedByForeman' && !body.reason) throw badField('reason', 'is needed')
  assertMarkFits(work, body.method, body.mark, body.reason)
  const who = await whoIsEntered(work, briefing, body)
  const language = body.language ?? ('language' in who ? who.language : work.actor.language)
  const made = await record(work, toRow(briefing, who, {
    key: body.key, method: body.method, mark: body.mark, language, signedAt, reason: body.reason ?? null, late: body.reason === 'late',
    enteredBy: work.actor.personId, withoutSignal: body.withoutSignal ?? false,
  }, work.now), { mayBeSealed: body.withoutSignal === true })
  return finish(work, made)
}

/** Somebody who missed a sealed talk reads it, answers its question and signs for themselves: an addendum. */
async function makeUp(work: Work, briefingId: string, body: MakeUpBody, talks: Talks): Promise<SignInAnswer> {
  const briefing = await requireBriefing(work.db, briefingId)
  const repeat = await findRepeat(work.db, briefingId, body.key) ?? await getSignInOfPerson(work.db, briefingId, work.actor.personId)
  if (repeat) return answerWith(work.db, repeat, { isRepeat: true })
  const expected = await expectedPeople(work.db, briefing.siteId, briefing.localDate)
  if (!expected.some(person => person.id === work.actor.personId)) throw notFound('briefing')
  if (!briefing.sealedAt) throw new Refusal('conflict', 'notSealed', { message: 'This briefing is still open: sign in with its code' })
  const graded = gradeCheck(talks, briefing, body.answer)
  if (!graded) throw badField('answer', 'is needed', 'answerNeeded')
  assertMarkFits(work, body.method, body.mark)
  const made = await record(work, toRow(briefing, { personId: work.actor.personId, language: work.actor.language }, {
    key: body.key, method: 'makeUp', mark: body.mark, language: body.language ?? work.actor.language, signedAt: work.now, answer: graded.answer,
  }, work.now), { mayBeSealed: true })
  return finish(work, made, graded.check)
}

const requireActor = (work: AnyWork): Work => {
  if (!work.actor) throw new Refusal('notSignedIn', 'notSignedIn', { message: 'Sign in first' })
  return work as Work
}

/** Takes a sign-in in any of its forms. `isRepeat` says that it stood there already. */
export async function signInToBriefing(work: AnyWork, briefingId: string, body: SignInSheetBody, caller: Caller, talks: Talks): Promise<SignInAnswer> {
  if (body.method === 'ownPhone') return signInOnOwnPhone(work, briefingId, body, caller, talks)
  if (body.method === 'makeUp') return makeUp(requireActor(work), briefingId, body, talks)
  return signInByLead(requireActor(work), briefingId, body)
}

/** Takes a line off the list, by who runs the briefing, until the seal; the row stays as a trace. */
export async function undoSignIn(work: Work, briefingId: string, signInId: string): Promise<void> {
  const briefing = await requireOwnBriefing(work, briefingId)
  if (briefing.sealedAt) throw refuseSealed()
  await work.db.transaction(async (trx) => {
    const signIn = await getSignIn(trx, briefingId, signInId)
    if (!signIn) throw notFound('sign-in')
    await removeSignIn(trx, signInId, work.now, work.actor.personId)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'briefing.signInUndone', subject: { kind: 'briefing', id: briefingId }, before: { signInId, personId: signIn.personId, name: signIn.name } })
  })
  tellBriefing(briefingId, { kind: 'signIn', data: { id: signInId, removed: true } })
}
