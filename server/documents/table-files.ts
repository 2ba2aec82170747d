import { Readable } from 'node:stream'
import { stringify } from 'csv-stringify/sync'
import ical, { ICalAlarmType } from 'ical-generator'
import type { Content } from 'pdfmake/interfaces'
import writeXlsxFile, { type SheetData } from 'write-excel-file/node'
import type { CalendarDate } from '#shared/domain/dates'
import type { Language } from '#shared/domain/states'
import { renderPdf, ruledTable } from './pdf'

/** Text, a number, a calendar date, or nothing. */
export type Cell = string | number | { date: CalendarDate } | null | undefined

/** What a row means for a calendar: an all-day event on its date, or one of so many minutes from an instant. */
export interface RowEvent {
  /** Stays the same for the same thing, so that calendars replace their copy. */
  id: string
  sequence?: number
  on: CalendarDate | { startsAt: string, minutes: number }
  summary: string
  description?: string
  location?: string
  /** A reminder so many days before, with its words. */
  warning?: { days: number, text: string }
}
export interface TableRow { cells: readonly Cell[], event?: RowEvent }

/** A list that can be written to a file. `width` is in letters; columns that are narrow on paper may be dropped there. */
export interface Table {
  title: string
  /** The file's name without date and ending, in plain letters. */
  fileName: string
  columns: readonly { title: string, width: number }[]
  /** Rows in pieces, as the database gives them. */
  pieces: AsyncIterable<readonly TableRow[]>
  /** Words at the foot of each printed page. */
  footNote?: string
}

export interface TableContext { language: Language, company: string, today: CalendarDate, now: string }

/** Text that a spreadsheet would run: it starts like a formula (also in full-width signs), a command or a control sign. */
const startsLikeFormula = /^[=+\-@\t\r\n\0%|＝＋－＠]/

/** The text with an apostrophe before it where a spreadsheet would take it for a formula. */
export const asPlainCell = (text: string) => startsLikeFormula.test(text) ? `'${text}` : text

const isDate = (cell: Cell): cell is { date: CalendarDate } => typeof cell === 'object' && cell !== null
const csvCell = (cell: Cell) => (typeof cell === 'string' ? asPlainCell(cell) : isDate(cell) ? cell.date : cell ?? '')
const paperCell = (cell: Cell): Content => (isDate(cell) ? cell.date : typeof cell === 'number' ? { text: String(cell), alignment: 'right' } : cell ?? '')
function sheetCell(cell: Cell) {
  if (isDate(cell)) return { value: new Date(`${cell.date}T00:00:00Z`), type: Date, format: 'yyyy-mm-dd' }
  if (typeof cell === 'number') return { value: cell, type: Number }
  return cell ? { value: cell, type: String } : null
}

/** A CSV (RFC 4180, UTF-8 with its mark, CRLF), written piece by piece while the rows arrive: dates as YYYY-MM-DD, numbers as numbers, text never a formula. */
export function tableCsv({ columns, pieces }: Table): Readable {
  const options = { record_delimiter: 'windows' as const, quoted_match: /[\r\n]/ }
  async function* text() {
    yield stringify([columns.map(column => column.title)], { ...options, bom: true })
    for await (const piece of pieces) {
      if (piece.length > 0) yield stringify(piece.map(row => row.cells.map(csvCell)), options)
    }
  }
  return Readable.from(text(), { objectMode: false, highWaterMark: 1024 * 1024 })
}

/** A workbook of one sheet with a header that stays in view; dates are dates, text is never a formula. */
export async function tableSheet({ title, columns }: Table, rows: readonly TableRow[]): Promise<Buffer> {
  const data: SheetData = [columns.map(({ title: value }) => ({ value, type: String, fontWeight: 'bold' as const })), ...rows.map(row => row.cells.map(sheetCell))]
  return writeXlsxFile(data, { sheet: title.slice(0, 31), columns: columns.map(({ width }) => ({ width })), stickyRowsCount: 1, orientation: 'landscape' }).toBuffer()
}

/** Points between the margins of a landscape letter page, beside a cell's text, and of a date in 8 point. */
const [paperWidth, cellPadding, dateWidth] = [792 - 96, 8, 46]

const paperWords: Record<Language, { madeOn: (date: string) => string, count: (count: number) => string }> = {
  en: { madeOn: date => `State on ${date}`, count: count => `${count} in all` },
  es: { madeOn: date => `Estado al ${date}`, count: count => `${count} en total` },
}

/** The list on paper: landscape letter, the header on every page, columns in the share of their widths; empty columns are left out. */
export function tablePaper({ title, columns, footNote }: Table, rows: readonly TableRow[], { language, company, today }: TableContext): Promise<Buffer> {
  const isUsed = columns.map((_, index) => rows.length === 0 || rows.some(row => (row.cells[index] ?? '') !== ''))
  const kept = columns.flatMap((column, index) => (isUsed[index] ? [{ ...column, isDate: rows.some(row => isDate(row.cells[index])) }] : []))
  const left = paperWidth - kept.length * cellPadding - kept.filter(column => column.isDate).length * dateWidth
  const total = kept.reduce((sum, column) => sum + (column.isDate ? 0 : column.width), 0)
  const body: Content[][] = [kept.map(column => ({ text: column.title, bold: true })), ...rows.map(row => row.cells.filter((_, index) => isUsed[index]).map(paperCell))]
  const words = paperWords[language]
  return renderPdf({
    pageOrientation: 'landscape',
    info: { title: `${title} · ${company}` },
    defaultStyle: { fontSize: 8 },
    content: [
      { text: `${company}: ${title.toLowerCase()}`, fontSize: 15, bold: true },
      { text: `${words.madeOn(today)} · ${words.count(rows.length)}`, margin: [0, 2, 0, 10] },
      { table: { headerRows: 1, keepWithHeaderRows: 1, dontBreakRows: true, widths: kept.map(column => (column.isDate ? dateWidth : column.width / total * left)), body }, layout: ruledTable },
    ],
  }, { language, footNote: footNote ? `${company} · ${footNote}` : company })
}

/** The rows' events as a calendar (RFC 5545). Days are given as text: a local Date would shift them. */
export function tableCalendar({ title }: Table, rows: readonly TableRow[], { language, company, now }: TableContext): string {
  const calendar = ical({ name: `${company}: ${title}`, prodId: { company: 'Pourwright', product: title, language: language.toUpperCase() } })
  for (const { event } of rows) {
    if (!event) continue
    const { id, on, warning, ...words } = event
    const time = typeof on === 'string' ? { start: on, allDay: true } : { start: on.startsAt, end: new Date(Date.parse(on.startsAt) + on.minutes * 60_000).toISOString() }
    const entry = calendar.createEvent({ id: `${id}@pourwright`, stamp: now, ...time, ...words })
    if (warning) entry.createAlarm({ type: ICalAlarmType.display, triggerBefore: warning.days * 24 * 60 * 60, description: warning.text })
  }
  return calendar.toString()
}

/** Rows that are all there already. */
export async function* inOnePiece(rows: readonly TableRow[]): AsyncGenerator<readonly TableRow[]> {
  yield rows
}
