import { isTooYoungFor } from './age-limits'
import { addDays, type CalendarDate } from './dates'
import {
  type Fix, hasStandingKnowledge, isInPractice, type Learning, type Missing, type ModuleMinutes, nearestReason, whyMissing,
} from './missing'
import type { PreparedRules, RuleGroup } from './rules'
import type { ClearanceState } from './states'
import {
  type Credential, type CredentialType, earlierOf, expiryForDuty, isCountingOn, isForSite, lastCountingDay, laterOf,
} from './validity'

/** What clearance needs to know of a person. */
export interface ClearancePerson {
  id: string
  /** The first day of work. */
  hiredOn: CalendarDate
  /** The day on which the person left: from that day on they are not cleared. */
  leftOn?: CalendarDate | null
  /** The hidden day on which the person turns 18. */
  under18Until?: CalendarDate | null
}

/** A hold takes a person off all duties, first and last day included; without a last day, until it is ended. */
export interface Hold {
  from: CalendarDate
  to?: CalendarDate | null
}

/** What clearance needs to know of a duty. */
export interface ClearanceDuty {
  code: string
  /** False where nobody may do the duty while learning it. */
  learningBeside: boolean
  /** Months without doing the duty after which its craft credentials expire. */
  recencyMonths?: number | null
}

/** A competent person on site looked at a card that is not verified yet, and allows it for one day at one site. */
export interface Allowance {
  credentialId: string
  siteId: string
  date: CalendarDate
}

/** A person's credentials by type code. */
export type CredentialsByType = ReadonlyMap<string, readonly Credential[]>

/** One question of clearance. What belongs to the person is the person's alone; the rest is shared by all. */
export interface ClearanceQuestion {
  person: ClearancePerson
  duty: ClearanceDuty
  /** Null asks away from any site: site rules are left out, and per-site types do not count. */
  siteId: string | null
  /** The site's date. */
  date: CalendarDate
  rules: PreparedRules
  types: ReadonlyMap<string, CredentialType>
  /** The person's own, as a list or already by type. */
  credentials: readonly Credential[] | CredentialsByType
  holds?: readonly Hold[]
  allowances?: readonly Allowance[]
  /** By module slug. */
  learning?: ReadonlyMap<string, Learning>
  /** The last recorded day on which the person did this duty. */
  lastDoneOn?: CalendarDate | null
  /** By module slug. */
  moduleMinutes?: ReadonlyMap<string, ModuleMinutes>
}

/** The answer. Never stored as a fact; a record of work keeps a copy of what it said at the time. */
export interface Clearance {
  state: ClearanceState
  /** The last day on which the answer will still hold if nothing changes; null when nothing expires, or when not cleared. */
  until: CalendarDate | null
  /** What stands in the way, the person's own reasons first. Empty when cleared. */
  missing: Missing[]
  /** Credentials that count for this day only, by an allowance. */
  allowedFor: string[]
}

interface GroupAnswer {
  until: CalendarDate | null
  missing: Missing | null
  isLearnable: boolean
  allowedFor: string | null
}

/** Groups a person's credentials by type, for many questions about the same person. */
export function credentialsByType(credentials: readonly Credential[]): CredentialsByType {
  const byType = new Map<string, Credential[]>()
  for (const credential of credentials) {
    const list = byType.get(credential.type)
    if (list) list.push(credential)
    else byType.set(credential.type, [credential])
  }
  return byType
}

/** True when a one-shift allowance may stand in for the verification: never where the law asks for a periodic evaluation itself. */
export function canBeAllowedForAShift(type: Pick<CredentialType, 'basis' | 'validity'>): boolean {
  return !(type.basis === 'law' && type.validity.kind === 'period')
}

/** True when a hold lies on the date. */
export function isOnHold(holds: readonly Hold[], date: CalendarDate): boolean {
  return holds.some(hold => hold.from <= date && (!hold.to || date <= hold.to))
}

/** True from the first day of work until the day before leaving. */
export function isEmployedOn(person: Pick<ClearancePerson, 'hiredOn' | 'leftOn'>, date: CalendarDate): boolean {
  return person.hiredOn <= date && (!person.leftOn || date < person.leftOn)
}

/**
 * May this person do this duty at this site on this date; until when; and if not, what is missing and the
 * nearest fix. Every group of everybody, the site, the duty, and the duty at the site must be met.
 */
export function clearanceOf(question: ClearanceQuestion): Clearance {
  const prepared = { ...question, held: 'get' in question.credentials ? question.credentials : credentialsByType(question.credentials) }
  const ofPerson = missingOfPerson(question)
  const answers = question.rules.groupsFor(question.duty.code, question.siteId).map(group => answerGroup(group, prepared))
  const missing = [...ofPerson, ...answers.flatMap(answer => answer.missing ?? [])]
  const allowedFor = [...new Set(answers.flatMap(answer => answer.allowedFor ?? []))]
  const state = stateFrom(ofPerson, answers, question.duty)
  if (state === 'notCleared') return { state, until: null, missing, allowedFor: [] }
  const until = answers.reduce((first, answer) => earlierOf(first, answer.until), lastDayOfPerson(question))
  return { state, until, missing, allowedFor }
}

function stateFrom(ofPerson: readonly Missing[], answers: readonly GroupAnswer[], duty: ClearanceDuty): ClearanceState {
  if (ofPerson.length > 0) return 'notCleared'
  const unmet = answers.filter(answer => answer.missing !== null)
  if (unmet.length === 0) return 'cleared'
  return duty.learningBeside && unmet.every(answer => answer.isLearnable) ? 'learning' : 'notCleared'
}

function missingOfPerson({ person, duty, date, holds = [] }: ClearanceQuestion): Missing[] {
  const missing: Missing[] = []
  if (!isEmployedOn(person, date)) missing.push({ anyOf: [], why: { kind: 'notEmployed' }, fix: { kind: 'office' } })
  if (isOnHold(holds, date)) missing.push({ anyOf: [], why: { kind: 'onHold' }, fix: { kind: 'safetyManager' } })
  if (isTooYoungFor(duty.code, person.under18Until, date)) missing.push({ anyOf: [], why: { kind: 'underAge' }, fix: { kind: 'none' } })
  return missing
}

/** The eve of leaving or of the next hold, whichever comes first; null when neither is written down. */
function lastDayOfPerson({ person, date, holds = [] }: ClearanceQuestion): CalendarDate | null {
  const ends = holds.filter(hold => hold.from > date && (!hold.to || hold.to >= hold.from)).map(hold => hold.from)
  if (person.leftOn) ends.push(person.leftOn)
  const [first] = ends.sort()
  return first === undefined ? null : addDays(first, -1)
}

type PreparedQuestion = ClearanceQuestion & { held: CredentialsByType }

function answerGroup(group: RuleGroup, question: PreparedQuestion): GroupAnswer {
  let best: { until: CalendarDate | null, allowedFor: string | null } | null = null
  for (const code of group.anyOf) {
    for (const credential of question.held.get(code) ?? []) {
      const last = lastDayFor(credential, group, question)
      if (last === undefined) continue
      const isLonger = best === null || (last.until !== best.until && laterOf(last.until, best.until) === last.until)
      if (isLonger) best = last
    }
  }
  return best ? { ...best, missing: null, isLearnable: false } : answerUnmet(group, question)
}

/** Until when a credential meets the group, or undefined when it does not meet it on the date. */
function lastDayFor(
  credential: Credential, group: RuleGroup, question: PreparedQuestion,
): { until: CalendarDate | null, allowedFor: string | null } | undefined {
  const { date, siteId, allowances = [] } = question
  const type = question.types.get(credential.type)
  if (!type || !isForSite(credential, type, siteId)) return undefined
  const isAllowed = credential.verification === 'unverified' && canBeAllowedForAShift(type)
    && allowances.some(allowance => allowance.credentialId === credential.id && allowance.siteId === siteId && allowance.date === date)
  const seen: Credential = isAllowed ? { ...credential, verification: 'verified' } : credential
  if (!isCountingOn(seen, date)) return undefined
  const expiresOn = expiryForDuty(seen, type, recencyFor(group, question))
  if (expiresOn !== null && expiresOn < date) return undefined
  return isAllowed ? { until: date, allowedFor: credential.id } : { until: lastCountingDay({ ...seen, expiresOn }), allowedFor: null }
}

function recencyFor(group: RuleGroup, { duty, lastDoneOn }: ClearanceQuestion) {
  return group.isOfDuty ? { recencyMonths: duty.recencyMonths ?? null, lastDoneOn: lastDoneOn ?? null } : undefined
}

function answerUnmet(group: RuleGroup, question: PreparedQuestion): GroupAnswer {
  const ways = group.anyOf.map(code => wayToMeet(code, group, question))
  const learnable = ways.filter(way => way.isLearnable)
  const { credential: _credential, ...why } = nearestReason(ways.map(way => way.why))
  const [nearest] = [...ways].sort((first, second) => effortOf(first.fix) - effortOf(second.fix))
  return {
    missing: { anyOf: group.anyOf, why, fix: nearest?.fix ?? { kind: 'none' } },
    isLearnable: learnable.length > 0,
    until: learnable.length > 0 ? learnable.map(way => way.until).reduce(laterOf) : null,
    allowedFor: null,
  }
}

function wayToMeet(code: string, group: RuleGroup, question: PreparedQuestion) {
  const { siteId, date, types } = question
  const type = types.get(code) ?? { code, validity: { kind: 'never' }, basis: 'company', leadDays: 0 } satisfies CredentialType
  const held = types.has(code) ? question.held.get(code) ?? [] : []
  const why = whyMissing({ type, held, siteId, date, recency: recencyFor(group, question) })
  const learning = type.module ? question.learning?.get(type.module) : undefined
  const isKnown = hasStandingKnowledge(learning, held, date)
  return {
    why,
    fix: fixFor({ why, type, isKnown, question }),
    isLearnable: isKnown || isInPractice(learning, date),
    until: isKnown ? null : learning?.practiceTo ?? null,
  }
}

function fixFor(
  { why, type, isKnown, question }:
  { why: ReturnType<typeof whyMissing>, type: CredentialType, isKnown: boolean, question: PreparedQuestion },
): Fix {
  if (why.kind === 'notVerified' && why.credential) return { kind: 'verify', type: type.code, credentialId: why.credential.id }
  if (why.kind === 'notYetValid' && why.on) return { kind: 'wait', type: type.code, on: why.on }
  if (type.perSite) return { kind: 'orientation', type: type.code, siteId: question.siteId }
  if (!type.module) return { kind: 'card', type: type.code }
  const time = question.moduleMinutes?.get(type.module)
  if (isKnown) return { kind: 'signOff', module: type.module, minutes: time?.handsOnMinutes ?? null }
  return { kind: 'module', module: type.module, minutes: time ? time.minutes + time.handsOnMinutes : null }
}

/** Nearest first: look at a card, wait, be signed off, the shorter module, be shown round, get a card. */
function effortOf(fix: Fix): number {
  const step = ['verify', 'wait', 'signOff', 'module', 'orientation', 'card'].indexOf(fix.kind)
  const minutes = 'minutes' in fix ? fix.minutes ?? 0 : 0
  return (step < 0 ? 6 : step) * 100_000 + minutes
}
