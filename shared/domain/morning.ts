import type { Missing } from './missing'
import type { ClearanceState, MissingReason, WorkTag } from './states'

/** One duty of a person's crew and what the rules say about it today. */
export interface DutyToday {
  duty: string
  state: ClearanceState
  until: string | null
  missing: readonly Missing[]
}

/** A person's morning in one word, with the duties that stop them. `state` is null when there is no duty to ask about. */
export interface PersonMorning<Duty extends DutyToday = DutyToday> {
  state: ClearanceState | null
  stops: Duty[]
}

/** Reasons that mean something was there and no longer counts, or waits for somebody: worth a foreman's word before work. */
const LAPSED: readonly MissingReason[] = ['expired', 'notVerified', 'withdrawn', 'rejected', 'onHold']

const hasLapsed = (duty: DutyToday) => duty.state === 'notCleared' && duty.missing.some(missing => LAPSED.includes(missing.why.kind))

/**
 * Nobody on a crew is cleared for everything that the crew does. Somebody counts as cleared when they may do at least
 * one of its duties and none of the others was lost (expired, withdrawn, not verified); learning beside when they
 * may do none on their own but may learn one; otherwise not cleared. Stops are the lost duties, or for somebody who
 * may do nothing the duty with the least missing.
 */
export function morningOf<Duty extends DutyToday>(duties: readonly Duty[]): PersonMorning<Duty> {
  if (duties.length === 0) return { state: null, stops: [] }
  const lapsed = duties.filter(hasLapsed)
  if (lapsed.length > 0) return { state: 'notCleared', stops: lapsed }
  if (duties.some(duty => duty.state === 'cleared')) return { state: 'cleared', stops: [] }
  const learning = duties.filter(duty => duty.state === 'learning')
  if (learning.length > 0) return { state: 'learning', stops: learning.slice(0, 1) }
  const [nearest] = [...duties].sort((first, second) => first.missing.length - second.missing.length)
  return { state: 'notCleared', stops: nearest ? [nearest] : [] }
}

/** The work that a duty is for, where one stands for the other. */
const WORK_OF_DUTY: Readonly<Record<string, WorkTag>> = { 'stacker': 'stack', 'brace-hand': 'brace', 'rebar-hand': 'steel', 'telehandler-operator': 'lift' }

/** What a day without further word is planned to be, from the duties of the crews there. Pour duties plan no pour by themselves. */
export function usualWork(duties: readonly string[]): WorkTag[] {
  return [...new Set(duties.flatMap(duty => WORK_OF_DUTY[duty] ?? []))]
}
