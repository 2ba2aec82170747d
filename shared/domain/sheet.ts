import canonicalize from 'canonicalize'
import type { CalendarDate, Instant } from './dates'
import type { HandReason, Language, MarkKind, SignInMethod, WorkTag } from './states'

/** One line of a sheet: a person or a visitor, and their mark. */
export interface SheetLine {
  id: string
  name: string
  employer: string
  trade: string | null
  personId: string | null
  /** Whom a visitor came to see. */
  host: string | null
  method: SignInMethod
  reason: HandReason | null
  markKind: MarkKind
  /** Typed text, drawn strokes as JSON text, or the witness's name; null for a tap. */
  mark: string | null
  language: Language
  signedAt: Instant
  /** After the talk was over: briefed by the one who runs the briefing. */
  isLate: boolean
  isWithoutSignal: boolean
  /** A presence code shown at the talk was redeemed for it. */
  hasCode: boolean
  /** Who entered it, when it was not the person's own phone. */
  enteredBy: string | null
  /** The check question where it was asked: never a bare wrong answer. */
  check: 'right' | 'explainedAgain' | null
  /** Who explained it again; null when the screen did. */
  explainedBy: string | null
}

/** A morning check by the competent person, and what was mended. */
export interface SheetCheck {
  subject: string
  found: string
  mended: string | null
  checkedBy: string
}

/** Something to put right, with who and by when. */
export interface CorrectiveAction {
  what: string
  owner: string
  dueOn: CalendarDate | null
}

/** What a sheet and an addendum both say about where they belong and how they were sealed. */
interface SheetHead {
  version: 1
  /** Place in the site's chain, from 1. */
  number: number
  company: string
  briefingId: string
  siteId: string
  siteCode: string
  siteName: string
  timeZone: string
  date: CalendarDate
  sealedAt: Instant
  /** Who sealed it; null when the site's day ended first. */
  sealedBy: string | null
  /** The server's clock was set by hand. */
  isClockSet: boolean
}

/** The sealed record of a briefing: the union of what the published rules ask a sign-in sheet to hold. */
export interface BriefingSheet extends SheetHead {
  kind: 'sheet'
  siteAddress: string | null
  openedAt: Instant
  closedAt: Instant
  talk: { slug: string, title: Record<Language, string>, versions: Record<Language, string>, sources: string[] }
  speaker: { name: string, title: string, company: string, markKind: MarkKind, mark: string | null }
  interpreter: string | null
  work: WorkTag[]
  /** As the foreman entered it, US customary units. */
  weather: Readonly<Record<string, number | string>> | null
  notes: string | null
  questions: string[]
  actions: CorrectiveAction[]
  checks: SheetCheck[]
  /** Cards that nobody had verified yet, allowed for this one shift by a competent person; left out when there are none. */
  allowances?: { person: string, type: string, allowedBy: string }[]
  lines: SheetLine[]
  /** Expected people who were not there, and when they made it up. */
  absent: { name: string, personId: string, madeUpOn: CalendarDate | null }[]
  isWithoutSignal: boolean
  /** Sealed at the end of the site's day because nobody did it before. */
  isSealedByDayEnd: boolean
}

/** A correction or a late line after the seal: a sheet of the same chain that points at the one it adds to. */
export interface SheetAddendum extends SheetHead {
  kind: 'addendum'
  /** Hash of the sheet that it adds to. */
  addsTo: string
  writtenBy: string
  writtenAt: Instant
  text: string | null
  lines: SheetLine[]
}

/** What a chain link is made of. The first sheet of a site has no previous hash. */
export interface ChainLink {
  previousHash: string | null
  sheet: unknown
}

/** SHA-256 of a text as UTF-8, in lower-case hex. */
export type Sha256Hex = (text: string) => string

/**
 * The RFC 8785 canonical JSON of a sheet or of any other JSON value. Fields that are undefined are left out.
 * Throws a TypeError that names the place for what JSON cannot hold exactly: lone surrogates, numbers that are
 * not finite, big integers, functions, symbols, undefined in a list or alone, and objects that are not plain.
 */
export function canonicalSheet(sheet: unknown): string {
  refuseWhatJsonCannotHold(sheet, '$')
  return canonicalize(sheet) ?? ''
}

/** The text that is hashed for a link: the canonical form of `{ previousHash, sheet }`. */
export function hashInput({ previousHash, sheet }: ChainLink): string {
  return canonicalSheet({ previousHash, sheet })
}

/**
 * The index of the first link that does not hold, from the first sheet on, or null when all do: its hash is not
 * that of its content, or it does not point at the one before. A tail cut off cannot be seen from the chain alone.
 */
export function firstBrokenLink(chain: readonly (ChainLink & { hash: string })[], sha256: Sha256Hex): number | null {
  const broken = chain.findIndex((link, index) => {
    const before = chain[index - 1]?.hash ?? null
    return link.previousHash !== before || link.hash !== sha256(hashInput(link))
  })
  return broken === -1 ? null : broken
}

function refuseWhatJsonCannotHold(value: unknown, place: string): void {
  if (value === null || typeof value === 'boolean') return
  if (typeof value === 'string') return refuseLoneSurrogates(value, place)
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new TypeError(`Not a finite number at ${place}`)
    return
  }
  if (Array.isArray(value)) return Array.from(value).forEach((item, index) => refuseWhatJsonCannotHold(item, `${place}[${index}]`))
  if (!isPlainObject(value)) throw new TypeError(`JSON cannot hold what is at ${place}`)
  for (const [key, field] of Object.entries(value)) {
    refuseLoneSurrogates(key, place)
    if (field !== undefined) refuseWhatJsonCannotHold(field, `${place}.${key}`)
  }
}

function refuseLoneSurrogates(text: string, place: string): void {
  if (/\p{Surrogate}/u.test(text)) throw new TypeError(`Half a character (lone surrogate) at ${place}`)
}

function isPlainObject(value: unknown): value is Record<string, unknown> {
  if (typeof value !== 'object' || value === null) return false
  const prototype: unknown = Object.getPrototypeOf(value)
  return prototype === Object.prototype || prototype === null
}
