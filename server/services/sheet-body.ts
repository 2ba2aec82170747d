import { compareInstants } from '#shared/domain/dates'
import type { BriefingSheet, SheetLine } from '#shared/domain/sheet'
import type { Role } from '#shared/domain/states'
import type { Mark } from '#shared/schemas/mark'
import type { BriefingWithSite } from '../data/briefings'
import type { SignIn } from '../data/sign-ins'

/** A mark as a sheet keeps it: its kind, and what was left. */
export function toSheetMark(mark: Mark): Pick<SheetLine, 'markKind' | 'mark'> {
  const { kind } = mark
  return { markKind: kind, mark: kind === 'typed' ? mark.text : kind === 'drawn' ? JSON.stringify(mark.strokes) : kind === 'witnessed' ? mark.by : null }
}

/** A sign-in as a line of the sheet. */
export function toSheetLine(signIn: SignIn): SheetLine {
  const { id, name, employer, trade, visitor, personId, method, reason, mark, language, signedAt, answer } = signIn
  return {
    id, name, employer, trade, personId, host: visitor?.host ?? null, method, reason, ...toSheetMark(mark), language, signedAt,
    isLate: signIn.late, isWithoutSignal: signIn.withoutSignal, hasCode: signIn.presenceStep !== null, enteredBy: signIn.enteredByName,
    check: answer === null ? null : answer.isRight ? 'right' : 'explainedAgain', explainedBy: answer && !answer.isRight ? signIn.explainedByName : null,
  }
}

/** Where a sheet or addendum belongs, from its briefing. */
export function toSheetHead(briefing: BriefingWithSite) {
  const { id, siteId, site, localDate } = briefing
  return { version: 1, briefingId: id, siteId, siteCode: site.code, siteName: site.name, timeZone: site.timeZone, date: localDate } as const
}

interface SheetGiven {
  briefing: BriefingWithSite
  closedAt: string
  company: string
  speakerEmployer: string
  signIns: readonly SignIn[]
  /** The roster of that day: who is on it and did not sign is absent. */
  expected: readonly { id: string, name: string }[]
  /** One-shift allowances of that day, by the code of the card's type. */
  allowances: readonly { person: string, type: string, allowedBy: string }[]
  number: number
  seal: { sealedAt: string, sealedBy: string | null, isClockSet: boolean }
}

/** The sheet of a closed briefing. Who gave the talk signs by sealing it; sealed by somebody else or by the day's end, it bears no mark of the speaker. */
export function buildSheet({ briefing, closedAt, company, speakerEmployer, signIns, expected, allowances, number, seal }: SheetGiven): BriefingSheet {
  const { talkVersions: { en, es } } = briefing
  const signed = new Set(signIns.map(row => row.personId))
  return {
    kind: 'sheet', ...toSheetHead(briefing), number, company, siteAddress: briefing.site.address, openedAt: briefing.openedAt, closedAt,
    talk: { slug: briefing.talk, title: { en: en.title, es: es.title }, versions: { en: en.hash, es: es.hash }, sources: en.sources ?? [] },
    speaker: { name: briefing.runByName, title: briefing.runByRole as Role, company: speakerEmployer, markKind: 'typed', mark: seal.sealedBy === briefing.runByName ? briefing.runByName : null },
    interpreter: null, work: briefing.work, weather: briefing.weather ? { ...briefing.weather } : null, notes: briefing.notes, questions: [], actions: [], checks: [], ...(allowances.length > 0 && { allowances: [...allowances] }),
    lines: [...signIns].sort((first, second) => compareInstants(first.signedAt, second.signedAt)).map(toSheetLine),
    absent: expected.filter(person => !signed.has(person.id)).map(({ id, name }) => ({ name, personId: id, madeUpOn: null })),
    isWithoutSignal: briefing.withoutSignal, isSealedByDayEnd: seal.sealedBy === null, ...seal,
  }
}
