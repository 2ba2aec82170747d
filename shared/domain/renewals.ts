import type { CalendarDate } from './dates'

/** A card that ends, with its holder. */
export interface Ending { personId: string, type: string, expiresOn: CalendarDate }

/** People whose cards of one type can be renewed in one session. */
export interface RenewalGroup<Line extends Ending> {
  type: string
  /** Whose ends first, first; a person once, with the card that ends last (that is the one that counts). */
  lines: Line[]
  /** The last day on which a session still comes before anybody's card ends; the first day asked about when somebody's has ended. */
  bookBy: CalendarDate
}

/**
 * Groups cards that end by type, for booking sessions. Leaves out who has a seat in a session of that type, as
 * `personId/type`. The group that must be booked first stands first; ties by type.
 */
export function renewalGroups<Line extends Ending>(endings: readonly Line[], { today, seated = new Set() }: { today: CalendarDate, seated?: ReadonlySet<string> }): RenewalGroup<Line>[] {
  const last = new Map<string, Line>()
  for (const ending of endings) {
    const key = `${ending.personId}/${ending.type}`
    const known = last.get(key)
    if (!seated.has(key) && (!known || known.expiresOn < ending.expiresOn)) last.set(key, ending)
  }
  const groups = new Map<string, Line[]>()
  for (const line of last.values()) groups.set(line.type, [...groups.get(line.type) ?? [], line])
  return [...groups].map(([type, lines]) => {
    const sorted = lines.sort((first, second) => first.expiresOn.localeCompare(second.expiresOn) || first.personId.localeCompare(second.personId))
    const first = sorted[0]!.expiresOn
    return { type, lines: sorted, bookBy: first < today ? today : first }
  }).sort((first, second) => first.bookBy.localeCompare(second.bookBy) || first.type.localeCompare(second.type))
}

/** Who is invited and who waits: the first `seats` in order of coming; those already invited keep their seat as long as seats last. */
export function seatsFor<Person extends { personId: string, isInvited: boolean }>(people: readonly Person[], seats: number): Map<string, 'invited' | 'waiting'> {
  const ordered = [...people.filter(person => person.isInvited), ...people.filter(person => !person.isInvited)]
  return new Map(ordered.map((person, index) => [person.personId, index < seats ? 'invited' : 'waiting']))
}
