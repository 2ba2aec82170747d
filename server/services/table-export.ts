import type { Readable } from 'node:stream'
import type { ExportFormat } from '#shared/schemas/common'
import { tableCalendar, tableCsv, tablePaper, tableSheet, type Table, type TableContext, type TableRow } from '../documents/table-files'
import { Refusal } from './refusal'
import type { Work } from './work'

/** A file for the browser to keep. */
export interface Download { body: Readable | Buffer | string, type: string, fileName: string }

/** Most lines of a format that is made in one go; a CSV takes any number. */
const mostLines: Record<Exclude<ExportFormat, 'csv'>, number> = { xlsx: 50_000, pdf: 3_000, ics: 50_000 }
const types: Record<ExportFormat, string> = {
  csv: 'text/csv; charset=utf-8',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  pdf: 'application/pdf',
  ics: 'text/calendar; charset=utf-8',
}

/** All rows, or 422 `tooManyLines` as soon as there are more than the format takes. */
export async function allRows(pieces: AsyncIterable<readonly TableRow[]>, most: number): Promise<TableRow[]> {
  const rows: TableRow[] = []
  for await (const piece of pieces) {
    rows.push(...piece)
    if (rows.length > most) throw new Refusal('unprocessable', 'tooManyLines', { message: `At most ${most} lines in this format: narrow the filters, or take CSV`, data: { most } })
  }
  return rows
}

export const contextOf = (work: Work): TableContext => ({ language: work.actor.language, company: work.company.name, today: work.today, now: work.now })

/** The table in one of four formats, named with today or the days it covers. A CSV is written while the database is read; the others are made in one go. */
export async function exportTable(work: Work, format: ExportFormat, table: Table, dated = work.today): Promise<Download> {
  const file = { type: types[format], fileName: `${table.fileName}-${dated}.${format}` }
  if (format === 'csv') return { ...file, body: tableCsv(table) }
  const rows = await allRows(table.pieces, mostLines[format])
  if (format === 'xlsx') return { ...file, body: await tableSheet(table, rows) }
  if (format === 'pdf') return { ...file, body: await tablePaper(table, rows, contextOf(work)) }
  return { ...file, body: tableCalendar(table, rows, contextOf(work)) }
}

/** What a service answers page by page, as pieces. */
export async function* pagesOf<Item>(read: (paging: { page: number, perPage: number }) => Promise<{ items: readonly Item[], total: number }>): AsyncGenerator<readonly Item[]> {
  const perPage = 200
  for (let page = 1; ; page += 1) {
    const { items, total } = await read({ page, perPage })
    yield items
    if (page * perPage >= total || items.length === 0) return
  }
}

/** Each item of the pieces as a row. */
export async function* toRows<Item>(pieces: AsyncIterable<readonly Item[]>, toRow: (item: Item) => TableRow): AsyncGenerator<TableRow[]> {
  for await (const piece of pieces) yield piece.map(toRow)
}
