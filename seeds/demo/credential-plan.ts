import { addDays, addMonths, type CalendarDate, daysBetween, endOfMonth } from '../../shared/domain/dates'
import { expiryOf, type Validity } from '../../shared/domain/validity'
import { type DemoContext, weekdayOnOrBefore } from './context'
import { hiredOn, leftOn, personId } from './people'
import { createRandom, type Random } from './random'
import { type DemoPerson, hasSkill, roster, type Skill } from './roster'
import { isDuring, demoStays, mondayOfWeek, peopleOfStay, siteId } from './sites-and-crews'
import { blowoutDrillDaysAgo, issuedDaysAgo, runningOut } from './story'

/** What is planned for one credential before it becomes a row. */
export interface PlannedCredential {
  person: DemoPerson
  type: string
  issuedOn: CalendarDate
  expiresOn: CalendarDate | null
  siteId?: string
}

/** The types as the reference seeds left them, by code. */
export type DemoTypes = ReadonlyMap<string, { id: string, validity: Validity, module: string | null }>

/** What each skill asks somebody to hold. */
const typesOfSkill: Record<Skill, readonly string[]> = {
  s: ['stacking', 'running-bond'],
  b: ['bracing-and-plumb', 'fall-protection', 'scaffold-user'],
  r: ['steel'],
  h: ['pump-and-hose', 'blowout-response', 'fall-protection'],
  v: ['concrete-for-walls', 'pour-rate', 'fall-protection'],
  w: ['before-the-pour', 'blowout-response'],
  p: ['pump-and-hose', 'blowout-response'],
  t: ['lift-truck'],
  l: ['pour-lead', 'blowout-response', 'fall-protection'],
  f: ['first-aid-cpr'],
  k: ['silica', 'respirator-medical', 'respirator-fit', 'respirator-training'],
  e: ['scaffold-erector'],
  x: ['excavation'],
  a: ['aerial-lift'],
  o: ['outreach-card'],
}

/** The first two courses of the wall: who works here learned them elsewhere or in person, which the safety manager judged adequate. */
const groundModules = ['ready-for-site', 'working-at-height', 'what-the-wall-is-made-of', 'footings-and-layout', 'tools-and-cutting'] as const

const beforeHire = new Set(['outreach-card', 'first-aid-cpr'])
const printedMonths = 24

function typesFor(context: DemoContext, one: DemoPerson): string[] {
  const skills = Object.keys(typesOfSkill) as Skill[]
  const codes = skills.filter(skill => hasSkill(one, skill)).flatMap(skill => typesOfSkill[skill])
  const ground = hiredOn(context, one) < context.today ? groundModules : []
  return [...new Set([...ground, ...codes, ...(one.skills ? ['ladders'] : [])])]
}

const later = (first: CalendarDate, second: CalendarDate) => (first > second ? first : second)
const earlier = (first: CalendarDate, second: CalendarDate) => (first < second ? first : second)

/** The months that a credential of the type usually runs, or null when it never expires. */
function monthsOf(validity: Validity): number | null {
  if (validity.kind === 'never') return null
  return validity.kind === 'printed' ? printedMonths : validity.months
}

function planned(person: DemoPerson, type: string, validity: Validity, issuedOn: CalendarDate): PlannedCredential {
  const printed = validity.kind === 'printed' ? addMonths(issuedOn, printedMonths) : null
  return { person, type, issuedOn, expiresOn: expiryOf(validity, issuedOn, printed) }
}

/** The issue that makes a credential run out so many days from today; to the month's end, in that month. */
function issueForDaysLeft(today: CalendarDate, months: number, validity: Validity, days: number): CalendarDate {
  const isMonthEnd = validity.kind === 'period' && validity.anchor === 'monthEnd'
  const wanted = isMonthEnd && days < 0 ? endOfMonth(addMonths(today, -1)) : addDays(today, days)
  return isMonthEnd && days < 0 ? weekdayOnOrBefore(addMonths(wanted, -months)) : addMonths(wanted, -months)
}

/** A day of issue that leaves more than the warning time, after the hire and before the person left. */
function quietIssue(context: DemoContext, one: DemoPerson, type: string, months: number | null, random: Random): CalendarDate {
  const { today } = context
  const hired = hiredOn(context, one)
  const fixed = type === 'blowout-response' ? blowoutDrillDaysAgo : issuedDaysAgo[`${one.key} ${type}`]
  if (fixed !== undefined) return weekdayOnOrBefore(addDays(today, -fixed))
  const latest = addDays(earlier(today, leftOn(context, one) ?? today), -10)
  const span = months === null ? 700 : Math.round(months * 30) - 90
  const earliest = beforeHire.has(type) ? addDays(today, -span) : later(addDays(hired, 5), addDays(today, -span))
  const room = Math.max(0, daysBetween(earliest, latest))
  return later(earlier(weekdayOnOrBefore(addDays(earliest, random.between(0, months === null ? Math.min(room, 20) : room))), addDays(today, -1)), beforeHire.has(type) ? '0001-01-01' : hired)
}

/** The one before, for what is renewed yearly, so that two years of history stand behind today's. */
function theOneBefore(context: DemoContext, now: PlannedCredential, validity: Validity, random: Random): PlannedCredential[] {
  if (validity.kind !== 'period' || validity.months !== 12) return []
  const issuedOn = weekdayOnOrBefore(addDays(addMonths(now.issuedOn, -12), random.between(2, 16)))
  const isKept = issuedOn > addDays(hiredOn(context, now.person), 5) && issuedOn > addDays(context.today, -725)
  return isKept ? [planned(now.person, now.type, validity, issuedOn)] : []
}

function planFor(context: DemoContext, one: DemoPerson, types: DemoTypes): PlannedCredential[] {
  return typesFor(context, one).flatMap((type) => {
    const validity = types.get(type)?.validity ?? { kind: 'never' }
    const random = createRandom(`credential ${one.badge} ${type}`)
    const months = monthsOf(validity)
    const days = runningOut[`${one.key} ${type}`]
    const issuedOn = days !== undefined && months !== null ? issueForDaysLeft(context.today, months, validity, days) : quietIssue(context, one, type, months, random)
    const current = planned(one, type, validity, issuedOn)
    return [...theOneBefore(context, current, validity, random), current]
  })
}

/** Hazard communication on the first day; heat in one all-hands meeting a year, or in the first week for who came later. */
function planForEverybody(context: DemoContext, one: DemoPerson, types: DemoTypes): PlannedCredential[] {
  const hired = hiredOn(context, one)
  const end = earlier(context.today, leftOn(context, one) ?? context.today)
  const heat = types.get('heat-illness')?.validity ?? { kind: 'never' }
  const days = runningOut[`${one.key} heat-illness`]
  const meeting = weekdayOnOrBefore(addDays(context.today, -150))
  const meetings = [addDays(meeting, -364), days === undefined ? meeting : issueForDaysLeft(context.today, 12, heat, days)]
  const attended = meetings.filter(date => hired < date && date < end)
  const inFirstWeek = weekdayOnOrBefore(addDays(hired, 6))
  const heats = attended.length === 0 && inFirstWeek < end && one.employer !== 'sub' ? [inFirstWeek] : attended
  return [
    planned(one, 'hazard-communication', { kind: 'never' }, hired),
    ...heats.map(issuedOn => planned(one, 'heat-illness', heat, issuedOn)),
  ]
}

/** One orientation for each site at which somebody has worked, on their first day there. */
function planOrientations(context: DemoContext): PlannedCredential[] {
  const seen = new Set<string>()
  return demoStays.flatMap(stay => peopleOfStay(stay).flatMap((person) => {
    const hired = hiredOn(context, person)
    const issuedOn = later(hired, mondayOfWeek(context, stay.fromWeek))
    const isThere = issuedOn <= context.today && isDuring(context, stay, issuedOn) && issuedOn < (leftOn(context, person) ?? '9999-12-31')
    const once = `${personId(person)} ${stay.site}`
    if (!isThere || seen.has(once)) return []
    seen.add(once)
    return [{ person, type: 'site-orientation', issuedOn, expiresOn: null, siteId: siteId(stay.site) }]
  }))
}

/** Everything that was issued in the ordinary course, for everybody who is or was on the roster. */
export function planCredentials(context: DemoContext, types: DemoTypes): PlannedCredential[] {
  const known = roster.filter(one => hiredOn(context, one) <= context.today)
  return [...known.flatMap(one => [...planForEverybody(context, one, types), ...planFor(context, one, types)]), ...planOrientations(context)]
}
