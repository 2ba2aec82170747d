import { addDays, addMonths, type CalendarDate, daysBetween, endOfMonth, isCalendarDate } from './dates'
import type { CredentialState, ValidityAnchor, ValidityBasis, Verification } from './states'

/** How long a credential of a type lasts. A period without an anchor runs to the same day of the month. */
export type Validity
  = | { kind: 'never' }
    | { kind: 'period', months: number, anchor?: ValidityAnchor }
    | { kind: 'printed' }

/** What the rules need to know of a credential type; the stored type has its names and its source beside this. */
export interface CredentialType {
  code: string
  validity: Validity
  basis: ValidityBasis
  /** Days before the expiry from which it is due soon. */
  leadDays: number
  /** Such a credential names its site and counts only there (orientation). */
  perSite?: boolean
  /** Slug of the module that alone issues this type; missing for outside cards. */
  module?: string | null
}

/** What the rules need to know of one credential that a person holds or held. */
export interface Credential {
  id: string
  type: string
  issuedOn: CalendarDate
  /** The last good day; null when it never expires. */
  expiresOn: CalendarDate | null
  verification: Verification
  /** Withdrawn from this day on. */
  withdrawnOn?: CalendarDate | null
  /** For types that count at one site only. */
  siteId?: string | null
  /** The day on which earlier training elsewhere was judged adequate; the credential counts from then. */
  judgedOn?: CalendarDate | null
}

/** When a person last did a duty that asks for recent practice. */
export interface DutyRecency {
  /** Months after which the duty's craft credentials expire; null when the duty asks for none. */
  recencyMonths: number | null
  /** The last recorded day of doing that duty; null when none is recorded. */
  lastDoneOn: CalendarDate | null
}

/** What is wrong with a printed date for a validity. */
export type PrintedDateProblem = 'needed' | 'refused' | 'notADate' | 'beforeIssue'

/** What is wrong with a type's validity. */
export type ValidityProblem = 'monthsOutOfRange' | 'monthEndOverrunsLaw'

const MOST_MONTHS = 600

/**
 * What is wrong with the validity of a type, or null. A period is 1 to 600 whole months. A type whose interval
 * is law may not run to the month's end, because that would overrun the law's interval.
 */
export function validityProblem(type: Pick<CredentialType, 'validity' | 'basis'>): ValidityProblem | null {
  const { validity, basis } = type
  if (validity.kind !== 'period') return null
  if (!Number.isInteger(validity.months) || validity.months < 1 || validity.months > MOST_MONTHS) return 'monthsOutOfRange'
  return basis === 'law' && validity.anchor === 'monthEnd' ? 'monthEndOverrunsLaw' : null
}

/**
 * What is wrong with the expiry date entered by hand, or null. A printed validity needs one, not before the day
 * of issue; every other validity computes its own and refuses one.
 */
export function printedDateProblem(
  validity: Validity, issuedOn: CalendarDate, printed?: CalendarDate | null,
): PrintedDateProblem | null {
  const isGiven = printed !== undefined && printed !== null
  if (validity.kind !== 'printed') return isGiven ? 'refused' : null
  if (!isGiven) return 'needed'
  if (!isCalendarDate(printed)) return 'notADate'
  return printed < issuedOn ? 'beforeIssue' : null
}

/**
 * The last good day of a credential issued on a date; null when it never expires. The printed date is given
 * only for a printed validity. Throws a RangeError where `printedDateProblem` finds something.
 */
export function expiryOf(validity: Validity, issuedOn: CalendarDate, printed?: CalendarDate | null): CalendarDate | null {
  const problem = printedDateProblem(validity, issuedOn, printed)
  if (problem !== null) throw new RangeError(`The printed date is wrong for this type: ${problem}`)
  if (validity.kind === 'never') return null
  if (validity.kind === 'printed') return printed ?? null
  const sameDay = addMonths(issuedOn, validity.months)
  return validity.anchor === 'monthEnd' ? endOfMonth(sameDay) : sameDay
}

/** The first day on which a credential can count: its issue, or the later day on which it was judged adequate. */
export function countsFrom(credential: Pick<Credential, 'issuedOn' | 'judgedOn'>): CalendarDate {
  const { issuedOn, judgedOn } = credential
  return judgedOn && judgedOn > issuedOn ? judgedOn : issuedOn
}

/**
 * The last good day of a craft module's credential for a duty that asks for recent practice: so many months
 * after the last recorded day of doing the duty, or after the issue, because the hands-on is doing it; never
 * later than the credential's own expiry. Outside cards and duties without recency keep the credential's date.
 */
export function expiryForDuty(
  credential: Pick<Credential, 'issuedOn' | 'judgedOn' | 'expiresOn'>, type: Pick<CredentialType, 'module'>, recency?: DutyRecency,
): CalendarDate | null {
  if (!type.module || !recency || recency.recencyMonths === null) return credential.expiresOn
  const start = countsFrom(credential)
  const { lastDoneOn, recencyMonths } = recency
  const practiced = addMonths(lastDoneOn !== null && lastDoneOn > start ? lastDoneOn : start, recencyMonths)
  return earlierOf(credential.expiresOn, practiced)
}

/**
 * The last day on which a craft module's credential still counts for some duty that asks for it: what lists,
 * reminders and the look-ahead show. Without duties it is the credential's own expiry.
 */
export function expiryAcrossDuties(
  credential: Pick<Credential, 'issuedOn' | 'judgedOn' | 'expiresOn'>, type: Pick<CredentialType, 'module'>, recencies: readonly DutyRecency[],
): CalendarDate | null {
  if (recencies.length === 0) return credential.expiresOn
  return recencies
    .map(recency => expiryForDuty(credential, type, recency))
    .reduce((latest, expiry) => laterOf(latest, expiry))
}

/**
 * The state of a credential on a date, first match wins: rejected, withdrawn (on or before it), not verified,
 * not yet valid, expired (the expiry date itself is still good), due soon (the expiry is at most `leadDays`
 * after the date), in date.
 */
export function credentialStateOn(
  credential: Credential, type: Pick<CredentialType, 'leadDays'>, date: CalendarDate,
): CredentialState {
  if (credential.verification === 'rejected') return 'rejected'
  if (credential.withdrawnOn && credential.withdrawnOn <= date) return 'withdrawn'
  if (credential.verification === 'unverified') return 'unverified'
  if (countsFrom(credential) > date) return 'notYet'
  if (credential.expiresOn === null) return 'inDate'
  if (credential.expiresOn < date) return 'expired'
  return credential.expiresOn <= addDays(date, type.leadDays) ? 'dueSoon' : 'inDate'
}

/** True for the two states that count toward clearance: in date and due soon. */
export function isCounting(state: CredentialState): boolean {
  return state === 'inDate' || state === 'dueSoon'
}

/** True when the credential counts on the date. Says the same as `isCounting` of its state, at less cost. */
export function isCountingOn(credential: Credential, date: CalendarDate): boolean {
  if (credential.verification !== 'verified' || countsFrom(credential) > date) return false
  if (credential.withdrawnOn && credential.withdrawnOn <= date) return false
  return credential.expiresOn === null || credential.expiresOn >= date
}

/** True when a credential of the type can count at the site at all: a per-site type counts only at the site it names. */
export function isForSite(
  credential: Pick<Credential, 'siteId'>, type: Pick<CredentialType, 'perSite'>, siteId?: string | null,
): boolean {
  return !type.perSite || (siteId !== undefined && siteId !== null && credential.siteId === siteId)
}

/** The last day on which the credential counts if nothing changes: its expiry, or the eve of a withdrawal already dated. */
export function lastCountingDay(credential: Pick<Credential, 'expiresOn' | 'withdrawnOn'>): CalendarDate | null {
  return credential.withdrawnOn ? earlierOf(credential.expiresOn, addDays(credential.withdrawnOn, -1)) : credential.expiresOn
}

/**
 * Of one person's credentials, the one of the type that holds on a date: the counting one that lasts longest,
 * the newer one when two last equally long; null when none counts. A per-site type needs the site.
 */
export function effectiveCredential<C extends Credential>(
  credentials: readonly C[], type: Pick<CredentialType, 'code' | 'perSite'>, date: CalendarDate, siteId?: string | null,
): C | null {
  let best: C | null = null
  for (const credential of credentials) {
    if (credential.type !== type.code || !isForSite(credential, type, siteId) || !isCountingOn(credential, date)) continue
    if (best === null || outlasts(credential, best)) best = credential
  }
  return best
}

/**
 * The one credential that speaks for a person and type in a list: the effective one, otherwise the expired one
 * that lasted longest. Null when none counts or ever ran out, so that an old card is not chased after its renewal.
 */
export function standingCredential<C extends Credential>(
  credentials: readonly C[], type: Pick<CredentialType, 'code' | 'perSite'>, date: CalendarDate, siteId?: string | null,
): C | null {
  const effective = effectiveCredential(credentials, type, date, siteId)
  if (effective !== null) return effective
  const expired = credentials.filter(credential =>
    credential.type === type.code && isForSite(credential, type, siteId)
    && credentialStateOn(credential, { leadDays: 0 }, date) === 'expired')
  return expired.reduce<C | null>((best, credential) => best === null || outlasts(credential, best) ? credential : best, null)
}

/** Days from today until the expiry: 0 on the last good day, negative after it, null when it never expires. */
export function daysLeft(expiresOn: CalendarDate | null, today: CalendarDate): number | null {
  return expiresOn === null ? null : daysBetween(today, expiresOn)
}

/**
 * True when it expires from today to today + `days`, both included; with `includeExpired` also when it has
 * expired already. What never expires is never expiring.
 */
export function isExpiringWithin(
  { expiresOn, today, days, includeExpired = false }:
  { expiresOn: CalendarDate | null, today: CalendarDate, days: number, includeExpired?: boolean },
): boolean {
  if (expiresOn === null) return false
  if (expiresOn < today) return includeExpired
  return expiresOn <= addDays(today, days)
}

/** The earlier of two last days, where null means that there is none. */
export function earlierOf(first: CalendarDate | null, second: CalendarDate | null): CalendarDate | null {
  if (first === null) return second
  if (second === null) return first
  return first < second ? first : second
}

/** The later of two last days, where null means that there is none. */
export function laterOf(first: CalendarDate | null, second: CalendarDate | null): CalendarDate | null {
  if (first === null || second === null) return null
  return first > second ? first : second
}

function outlasts(credential: Credential, other: Credential): boolean {
  const [last, otherLast] = [lastCountingDay(credential), lastCountingDay(other)]
  if (last !== otherLast) return last === null || (otherLast !== null && last > otherLast)
  if (credential.issuedOn !== other.issuedOn) return credential.issuedOn > other.issuedOn
  return credential.id > other.id
}
