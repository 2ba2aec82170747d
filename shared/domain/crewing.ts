import { cheapestMatching, costOf, largestMatching, type Matching, shortRows } from './matching'
import type { SameDayFix } from './same-day-fix'
import type { ClearanceState } from './states'

/** So many people wanted for a duty. */
export interface CrewingSlot {
  duty: string
  count: number
}

/** A person put on a duty by hand. The slot is kept for them, cleared or not. */
export interface LockedPlace {
  duty: string
  personId: string
}

/** What clearance said of a rostered person for a duty, and what would clear them today. */
export interface CrewingPair {
  personId: string
  duty: string
  state: ClearanceState
  fix: SameDayFix | null
}

/** Somebody who must be on site that day, and who of the roster would do. It combines with any slot. */
export interface PresenceRequirement<R> {
  requirement: R
  metBy: readonly string[]
}

/** One day's question of crewing. */
export interface CrewingQuestion<R = unknown> {
  slots: readonly CrewingSlot[]
  /** Ids of the people rostered that day. */
  personIds: readonly string[]
  /** A pair that is not listed is not cleared and has no fix. */
  pairs: readonly CrewingPair[]
  locked?: readonly LockedPlace[]
  presence?: readonly PresenceRequirement<R>[]
}

/** The answer: crewed, or short with the reason and the shortest fix. */
export interface Crewing<R = unknown> {
  crewed: boolean
  /** Cleared people on their duties; then those learning beside one of them, one to one. */
  assignment: { duty: string, personId: string, beside?: string }[]
  short: CrewingSlot[]
  /** What nobody on the roster could fill, even with today's fixes. */
  unfillable: CrewingSlot[]
  presenceMissing: R[]
  /** Duties that share too few people, and those people; null when no slot is empty. */
  because: { duties: string[], people: string[] } | null
  /** Least minutes that fill the most slots; null when none is empty or nothing can be done today. */
  fix: { minutes: number, steps: { personId: string, duty: string, modules: string[] }[] } | null
}

/** What is wrong with a placement by hand, or null. */
export type LockProblem = 'notRostered' | 'noSlot' | 'personTwice'

interface Board {
  slots: { duty: string, lockedTo: string | null }[]
  people: string[]
  pairFor(slot: number, person: number): CrewingPair | null
}

/** What is wrong with the first placement that cannot be kept: not on the roster, no slot left, or the same person twice. */
export function lockProblem(
  { slots, personIds, locked = [] }: Pick<CrewingQuestion, 'slots' | 'personIds' | 'locked'>,
): LockProblem | null {
  if (locked.some(place => !personIds.includes(place.personId))) return 'notRostered'
  if (new Set(locked.map(place => place.personId)).size < locked.length) return 'personTwice'
  const wanted = (duty: string) => slots.filter(slot => slot.duty === duty).reduce((sum, slot) => sum + slot.count, 0)
  const isOver = locked.some(place => locked.filter(other => other.duty === place.duty).length > wanted(place.duty))
  return isOver ? 'noSlot' : null
}

/**
 * Crewed when a largest matching of cleared people fills every slot and every presence requirement is met by
 * somebody rostered. Exact, and the same for the same input: slots and people go by their ids. Throws a
 * RangeError where `lockProblem` finds something.
 */
export function crewingOf<R>(question: CrewingQuestion<R>): Crewing<R> {
  const problem = lockProblem(question)
  if (problem !== null) throw new RangeError(`A placement by hand cannot be kept: ${problem}`)
  const board = layOutBoard(question)
  const choices = board.slots.map((_, slot) => clearedFor(board, slot))
  const matching = largestMatching(choices)
  const presenceMissing = (question.presence ?? [])
    .filter(({ metBy }) => !metBy.some(id => question.personIds.includes(id)))
    .map(({ requirement }) => requirement)
  const short = countByDuty(board, matching)
  const reason = shortRows(choices, matching)
  const placed = placements(board, matching)
  return {
    crewed: short.length === 0 && presenceMissing.length === 0,
    assignment: [...placed, ...learners(question, placed)],
    short,
    presenceMissing,
    because: reason && {
      duties: [...new Set(reason.rows.map(row => dutyOf(board, row)))],
      people: reason.columns.map(column => personOf(board, column)),
    },
    ...shortestFix(board, short.length > 0),
  }
}

function layOutBoard({ slots, personIds, pairs, locked = [] }: CrewingQuestion): Board {
  const people = [...new Set(personIds)].sort()
  const known = new Map(pairs.map(pair => [keyOf(pair.personId, pair.duty), pair]))
  const duties = [...new Set(slots.map(slot => slot.duty))].sort()
  const places = duties.flatMap((duty) => {
    const count = slots.filter(slot => slot.duty === duty).reduce((sum, slot) => sum + slot.count, 0)
    const kept = locked.filter(place => place.duty === duty).map(place => place.personId).sort()
    return Array.from({ length: count }, (_, index) => ({ duty, lockedTo: kept[index] ?? null }))
  })
  const lockedPeople = new Set(locked.map(place => place.personId))

  function pairFor(slot: number, person: number): CrewingPair | null {
    const place = places[slot]
    const personId = people[person]
    if (place === undefined || personId === undefined) return null
    const isAllowed = place.lockedTo === null ? !lockedPeople.has(personId) : place.lockedTo === personId
    return isAllowed ? known.get(keyOf(personId, place.duty)) ?? null : null
  }

  return { slots: places, people, pairFor }
}

function clearedFor(board: Board, slot: number): number[] {
  return [...board.people.keys()].filter(person => board.pairFor(slot, person)?.state === 'cleared')
}

function placements(board: Board, matching: Matching): { duty: string, personId: string }[] {
  return matching.flatMap((person, slot) => person === null ? [] : [{ duty: dutyOf(board, slot), personId: personOf(board, person) }])
}

/** People without a place who may learn beside somebody placed, one to one, as many as can; somebody placed by hand only on that duty. */
function learners(
  { pairs, personIds, locked = [] }: CrewingQuestion, placed: readonly { duty: string, personId: string }[],
): { duty: string, personId: string, beside: string }[] {
  const busy = new Set(placed.map(place => place.personId))
  const free = [...new Set(personIds)].filter(id => !busy.has(id)).sort()
  const learning = new Set(pairs.filter(pair => pair.state === 'learning').map(pair => keyOf(pair.personId, pair.duty)))
  const kept = new Map(locked.map(place => [place.personId, place.duty]))
  const matching = largestMatching(free.map(id => [...placed.keys()].filter((index) => {
    const duty = placed[index]?.duty ?? ''
    return learning.has(keyOf(id, duty)) && (kept.get(id) ?? duty) === duty
  })))
  return matching.flatMap((index, row) => {
    const place = index === null ? undefined : placed[index]
    const personId = free[row]
    return place && personId ? [{ duty: place.duty, personId, beside: place.personId }] : []
  })
}

function shortestFix(board: Board, isShort: boolean): Pick<Crewing, 'fix' | 'unfillable'> {
  if (!isShort) return { fix: null, unfillable: [] }
  const costs = board.slots.map((_, slot) => [...board.people.keys()].map(person => costOfPair(board.pairFor(slot, person))))
  const matching = cheapestMatching(costs)
  const steps = matching.flatMap((person, slot) => {
    const pair = person === null ? null : board.pairFor(slot, person)
    return pair && pair.state !== 'cleared' ? [{ personId: pair.personId, duty: pair.duty, modules: pair.fix?.modules ?? [] }] : []
  })
  return {
    fix: steps.length > 0 ? { minutes: costOf(costs, matching), steps } : null,
    unfillable: countByDuty(board, matching),
  }
}

function costOfPair(pair: CrewingPair | null): number | null {
  if (pair === null) return null
  return pair.state === 'cleared' ? 0 : pair.fix?.minutes ?? null
}

function countByDuty(board: Board, matching: Matching): CrewingSlot[] {
  const counts = new Map<string, number>()
  for (const [slot, person] of matching.entries()) {
    if (person === null) counts.set(dutyOf(board, slot), (counts.get(dutyOf(board, slot)) ?? 0) + 1)
  }
  return [...counts].map(([duty, count]) => ({ duty, count }))
}

function dutyOf(board: Board, slot: number): string {
  return board.slots[slot]?.duty ?? ''
}

function personOf(board: Board, person: number): string {
  return board.people[person] ?? ''
}

function keyOf(personId: string, duty: string): string {
  return JSON.stringify([personId, duty])
}
