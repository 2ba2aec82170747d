import type { Content, TableCell } from 'pdfmake/interfaces'
import type { BriefingSheet, SheetAddendum, SheetLine } from '#shared/domain/sheet'
import type { Language, Role } from '#shared/domain/states'
import type { Weather } from '#shared/schemas/weather'
import { renderPdf, ruledTable } from './pdf'
import { qrSvg } from './qr'
import { sheetWords, type SheetWords } from './sheet-words'
import { signatureSvg } from './signature-svg'

interface Sealed<Body> { body: Body, hash: string, previousHash: string | null, checkUrl: string }
export interface SheetDocument { sheet: Sealed<BriefingSheet>, addenda: Sealed<SheetAddendum>[], language: Language }

interface Say { words: SheetWords, language: Language, timeZone: string }

const tagOf = { en: 'en-US', es: 'es-US' } as const
const timeOf = (instant: string, { language, timeZone }: Say) => new Intl.DateTimeFormat(tagOf[language], { hour: 'numeric', minute: '2-digit', timeZone }).format(new Date(instant)).replace(/\s/g, ' ')
const momentOf = (instant: string, { language, timeZone }: Say) => new Intl.DateTimeFormat(tagOf[language], { dateStyle: 'medium', timeStyle: 'short', timeZone }).format(new Date(instant)).replace(/\s/g, ' ')
const dayOf = (date: string, language: Language) => new Intl.DateTimeFormat(tagOf[language], { weekday: 'long', year: 'numeric', month: 'long', day: 'numeric', timeZone: 'UTC' }).format(new Date(`${date}T12:00:00Z`))

/** Whole minutes that the talk took, rounded, never below zero. */
const minutesOf = ({ openedAt, closedAt }: BriefingSheet) => Math.max(0, Math.round((Date.parse(closedAt) - Date.parse(openedAt)) / 60_000))

function weatherWords(weather: BriefingSheet['weather'], words: SheetWords): string {
  if (!weather) return ''
  const { temperatureF, windMph, humidity, concreteF, sky }: Weather = weather
  return [
    temperatureF !== undefined && `${temperatureF} °F`, windMph !== undefined && words.wind(windMph), humidity !== undefined && words.humidity(humidity),
    concreteF !== undefined && words.concrete(concreteF), sky && words.sky[sky],
  ].filter(Boolean).join(', ')
}

function markCell(signIn: SheetLine, words: SheetWords): TableCell {
  const { markKind, mark } = signIn
  if (markKind === 'drawn' && mark) return { svg: signatureSvg(JSON.parse(mark) as [number, number][][]), width: 84 }
  if (markKind === 'typed') return { text: mark ?? '', italics: true }
  return { text: markKind === 'witnessed' ? words.witnessed(mark ?? '') : words.heard, fontSize: 8 }
}

function howWords(signIn: SheetLine, { words }: Say): string {
  const { method, reason, isLate, enteredBy, isWithoutSignal, hasCode, check, explainedBy, language } = signIn
  return [
    words.method[method], reason && reason !== 'late' && words.reason[reason], hasCode && words.presence, words.lang[language],
    isLate ? words.late(enteredBy ?? '–') : enteredBy && method !== 'addedByForeman' && words.enteredBy(enteredBy),
    isWithoutSignal && words.withoutSignal,
    check === 'right' ? words.checkRight : check === 'explainedAgain' && (explainedBy ? words.explained(explainedBy) : words.explainedHere),
  ].filter(Boolean).join(', ')
}

function signInTable(signIns: readonly SheetLine[], say: Say): Content {
  const [number, name, employer, how, time, mark] = say.words.columns
  const rows: TableCell[][] = signIns.map((signIn, index) => [
    { text: String(index + 1), alignment: 'right' },
    { text: signIn.name, bold: true },
    [signIn.employer, signIn.trade, signIn.host && `${say.words.host} ${signIn.host}`].filter(Boolean).join(', '),
    { text: howWords(signIn, say), fontSize: 8 },
    { text: timeOf(signIn.signedAt, say), noWrap: true },
    markCell(signIn, say.words),
  ])
  return {
    layout: ruledTable, margin: [0, 10, 0, 8], fontSize: 9,
    table: { headerRows: 1, dontBreakRows: true, widths: [20, '*', 92, 112, 48, 88], body: [[number, name, employer, how, time, mark].map(text => ({ text, bold: true })), ...rows] },
  }
}

function facts({ body }: Sealed<BriefingSheet>, say: Say): Content {
  const { words, language } = say
  const other = language === 'en' ? 'es' : 'en'
  const rows: [string, string][] = [
    [words.site, `${body.siteName} (${body.siteCode})`],
    [words.address, body.siteAddress ?? ''],
    [words.date, dayOf(body.date, language)],
    [words.time, `${timeOf(body.openedAt, say)} – ${timeOf(body.closedAt, say)} (${words.minutes(minutesOf(body))})`],
    [words.topic, `${body.talk.title[language]} / ${body.talk.title[other]}`],
    [words.reference, `${body.talk.slug} · en ${body.talk.versions.en.slice(0, 12)} · es ${body.talk.versions.es.slice(0, 12)}`],
    [words.speaker, `${body.speaker.name}, ${words.role[body.speaker.title as Role] ?? body.speaker.title}, ${body.speaker.company}`],
    [words.languages, [...new Set(body.lines.map(line => line.language))].sort().map(code => words.lang[code]).join(', ')],
    [words.interpreter, body.interpreter ?? words.none],
    [words.work, body.work.map(tag => words.tags[tag]).join(', ')],
    [words.weather, weatherWords(body.weather, words)],
    [words.notes, body.notes ?? ''],
  ]
  return { layout: 'noBorders', table: { widths: [104, '*'], body: rows.filter(([, value]) => value !== '').map(([label, value]) => [{ text: label, color: '#4A5155' }, value]) } }
}

async function sealBlock({ body, hash, previousHash, checkUrl }: Sealed<BriefingSheet | SheetAddendum>, say: Say): Promise<Content> {
  const { words } = say
  const at = momentOf(body.sealedAt, say)
  return {
    unbreakable: true, margin: [0, 8, 0, 0],
    columns: [
      { svg: await qrSvg(checkUrl), width: 84 },
      {
        width: '*', margin: [10, 4, 0, 0], fontSize: 8,
        stack: [
          { text: body.sealedBy === null ? words.sealedByDay(at) : words.sealed(at, body.sealedBy), bold: true },
          ...(body.isClockSet ? [words.clock] : []),
          { text: `${words.hash}:`, margin: [0, 3, 0, 0] }, { text: hash, font: 'DejaVuMono', fontSize: 7 },
          { text: `${words.previous}:`, margin: [0, 3, 0, 0] }, { text: previousHash ?? words.first, font: 'DejaVuMono', fontSize: 7 },
          { text: `${words.recheck} ${checkUrl}`, margin: [0, 3, 0, 0], fontSize: 7 },
        ],
      },
    ],
  }
}

async function addendumBlock(addendum: Sealed<SheetAddendum>, say: Say): Promise<Content[]> {
  const { body } = addendum
  return [
    { text: `${say.words.addendum} ${body.number}: ${body.text ? say.words.correction : say.words.lateSignIn}`, bold: true, fontSize: 12, margin: [0, 16, 0, 4] },
    ...(body.text ? [{ text: body.text }] : []),
    ...(body.lines.length > 0 ? [signInTable(body.lines, say)] : []),
    await sealBlock(addendum, say),
  ]
}

/** The sealed sheet on paper: every field that the published rules ask for, the marks, the seal, and its addenda. */
export async function renderSheet({ sheet, addenda, language }: SheetDocument): Promise<Buffer> {
  const words = sheetWords[language]
  const say: Say = { words, language, timeZone: sheet.body.timeZone }
  const { body } = sheet
  const absent = body.absent.length > 0 ? `${words.absent}: ${body.absent.map(person => person.name).join('; ')}` : words.nobodyAbsent
  const more = (await Promise.all(addenda.map(addendum => addendumBlock(addendum, say)))).flat()
  return renderPdf({
    info: { title: `${words.title}, ${body.siteName}, ${body.date}` },
    content: [
      { columns: [{ text: words.title, bold: true, fontSize: 17, width: '*' }, { text: `${words.sheet} ${body.number}`, alignment: 'right', width: 'auto', fontSize: 11 }] },
      { text: body.company, margin: [0, 0, 0, 8] },
      facts(sheet, say),
      signInTable(body.lines, say),
      { text: absent },
      ...(body.allowances ?? []).map(({ person, type, allowedBy }): Content => ({ text: words.allowance(person, type, allowedBy), margin: [0, 3, 0, 0] })),
      await sealBlock(sheet, say),
      ...more,
      { text: words.sources, fontSize: 8, margin: [0, 12, 0, 0] },
    ],
  }, { language, footNote: `Pourwright · ${body.siteCode} · ${body.date} · ${sheet.hash.slice(0, 16)}` })
}
