import type { CalendarDate } from './dates'
import type { MissingReason } from './states'
import {
  countsFrom, type Credential, type CredentialType, credentialStateOn, expiryForDuty, isForSite, type DutyRecency,
} from './validity'

/** Why a group is not met, with the date that matters where there is one, and the type it speaks of. */
export interface Why {
  kind: MissingReason
  type?: string
  /** Expired: the last good day. Not yet valid: the first. Withdrawn: the day of it. */
  on?: CalendarDate
}

/** The nearest thing that would mend it. Minutes are null when they are not known. */
export type Fix
  = | { kind: 'verify', type: string, credentialId: string }
    | { kind: 'signOff', module: string, minutes: number | null }
    | { kind: 'module', module: string, minutes: number | null }
    | { kind: 'orientation', type: string, siteId: string | null }
    | { kind: 'card', type: string }
    | { kind: 'wait', type: string, on: CalendarDate }
    | { kind: 'safetyManager' }
    | { kind: 'office' }
    | { kind: 'none' }

/** One thing that stands between a person and a duty. `anyOf` is empty when it concerns the person, not a rule's group. */
export interface Missing {
  anyOf: readonly string[]
  why: Why
  fix: Fix
}

/** How long a module takes, in minutes: its lessons and quiz, and its hands-on with the assessor's part. */
export interface ModuleMinutes {
  minutes: number
  handsOnMinutes: number
}

/** What a person has learned of a module without holding its credential yet. */
export interface Learning {
  /** The day on which the quiz was last passed. */
  passedOn?: CalendarDate | null
  /** Booked practice beside a named person, both days included. */
  practiceFrom?: CalendarDate | null
  practiceTo?: CalendarDate | null
}

/** What there is to know about one type when a group is not met. */
export interface TypeQuestion {
  type: CredentialType
  held: readonly Credential[]
  siteId: string | null
  date: CalendarDate
  recency?: DutyRecency
}

/** Order in which the reasons are told when several types could meet a group: the one nearest to good first. */
const NEAREST_REASON: readonly MissingReason[] = ['notVerified', 'notYetValid', 'expired', 'withdrawn', 'rejected', 'neverHeld']

/** Why the type does not count for the person: the reason of the credential nearest to good, the latest among equals. */
export function whyMissing({ type, held, siteId, date, recency }: TypeQuestion): Why & { credential?: Credential } {
  const reasons = held
    .filter(credential => isForSite(credential, type, siteId))
    .map(credential => reasonOf(credential, { type, date, recency }))
  return nearestReason([...reasons, { kind: 'neverHeld', type: type.code }])
}

/** Of several reasons the one nearest to good; among equals the latest date. */
export function nearestReason<W extends Why>(reasons: readonly W[]): W {
  const [first, ...others] = reasons
  if (first === undefined) throw new RangeError('There is no reason to choose from')
  return others.reduce((best, reason) => isNearer(reason, best) ? reason : best, first)
}

/**
 * True when the person's knowledge of the module still stands on the date: the quiz was passed by then, after
 * the issue of any credential of it that has run out, and not before a withdrawal.
 */
export function hasStandingKnowledge(learning: Learning | undefined, held: readonly Credential[], date: CalendarDate): boolean {
  const passedOn = learning?.passedOn
  if (!passedOn || passedOn > date) return false
  return held.every(({ issuedOn, withdrawnOn }) =>
    passedOn > issuedOn && (!withdrawnOn || withdrawnOn > date || passedOn >= withdrawnOn))
}

/** True on a day of booked practice, first and last day included. */
export function isInPractice(learning: Learning | undefined, date: CalendarDate): boolean {
  const { practiceFrom, practiceTo } = learning ?? {}
  return !!practiceFrom && practiceFrom <= date && (!practiceTo || date <= practiceTo)
}

function reasonOf(
  credential: Credential, { type, date, recency }: Pick<TypeQuestion, 'type' | 'date' | 'recency'>,
): Why & { credential: Credential } {
  const expiresOn = expiryForDuty(credential, type, recency)
  const state = credentialStateOn({ ...credential, expiresOn }, type, date)
  const base = { type: type.code, credential }
  if (state === 'rejected') return { ...base, kind: 'rejected' }
  if (state === 'unverified') return { ...base, kind: 'notVerified' }
  if (state === 'notYet') return { ...base, kind: 'notYetValid', on: countsFrom(credential) }
  if (state === 'withdrawn') return { ...base, kind: 'withdrawn', on: credential.withdrawnOn ?? date }
  if (state === 'expired' && expiresOn !== null) return { ...base, kind: 'expired', on: expiresOn }
  throw new RangeError(`Credential ${credential.id} counts on ${date}, so it is not missing`)
}

function isNearer(reason: Why, best: Why): boolean {
  const [rank, bestRank] = [NEAREST_REASON.indexOf(reason.kind), NEAREST_REASON.indexOf(best.kind)]
  if (rank !== bestRank) return rank < bestRank
  return (reason.on ?? '') > (best.on ?? '')
}
