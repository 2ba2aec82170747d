import type { Readable } from 'node:stream'
import type { Language } from '#shared/domain/states'
import type { CredentialFilters, CredentialItem, exportFormats } from '#shared/schemas/credentials'
import { listVersions } from '../data/credentials'
import type { Db } from '../data/database'
import { listCredentialIds, listCredentialsByIds, type CredentialQuery } from '../data/views/credential-list'
import { credentialCsv } from '../documents/credential-csv'
import { credentialPaper } from '../documents/credential-paper'
import { credentialSheet } from '../documents/credential-sheet'
import { credentialWords } from '../documents/credential-words'
import { renewalCalendar } from '../documents/renewal-calendar'
import { toCredentialQuery } from './credentials'
import { Refusal } from './refusal'
import type { Work } from './work'

export type ExportFormat = (typeof exportFormats)[number]

/** A file for the browser to keep. */
export interface Download { body: Readable | Buffer | string, type: string, fileName: string }

const pieceSize = 500
/** Most lines of a format that is made in one go; a CSV takes any number. */
const mostLines: Record<Exclude<ExportFormat, 'csv'>, number> = { xlsx: 50_000, pdf: 3_000, ics: 50_000 }
const types: Record<ExportFormat, string> = {
  csv: 'text/csv; charset=utf-8',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  pdf: 'application/pdf',
  ics: 'text/calendar; charset=utf-8',
}

async function* inPieces(db: Db, ids: string[], today: string): AsyncGenerator<CredentialItem[]> {
  for (let start = 0; start < ids.length; start += pieceSize) yield await listCredentialsByIds(db, ids.slice(start, start + pieceSize), today)
}

async function allOf(pieces: AsyncIterable<CredentialItem[]>): Promise<CredentialItem[]> {
  const items: CredentialItem[] = []
  for await (const piece of pieces) items.push(...piece)
  return items
}

/** The renewals of a query as an iCalendar text. */
export async function calendarOf(work: Pick<Work<null>, 'db' | 'now' | 'company'>, query: CredentialQuery, language: Language): Promise<string> {
  const ids = await listCredentialIds(work.db, query, language)
  const items = await allOf(inPieces(work.db, ids, query.today))
  const versions = new Map<string, number>()
  for (let start = 0; start < ids.length; start += pieceSize) {
    for (const [id, version] of await listVersions(work.db, ids.slice(start, start + pieceSize))) versions.set(id, version)
  }
  return renewalCalendar(items, { language, company: work.company.name, now: work.now, versions })
}

async function bodyOf(work: Work, format: ExportFormat, query: CredentialQuery): Promise<Download['body']> {
  const { language } = work.actor
  const ids = await listCredentialIds(work.db, query, language)
  const pieces = inPieces(work.db, ids, work.today)
  if (format === 'csv') return credentialCsv(pieces, language)
  if (ids.length > mostLines[format]) throw new Refusal('unprocessable', 'tooManyLines', { message: `At most ${mostLines[format]} lines in this format: narrow the filters, or take CSV`, data: { most: mostLines[format] } })
  if (format === 'ics') return calendarOf(work, query, language)
  const items = await allOf(pieces)
  return format === 'xlsx' ? credentialSheet(items, language) : credentialPaper(items, { language, company: work.company.name, today: work.today })
}

/** The whole filtered list in one of four formats, in the reader's language. CSV is written while the database is read. */
export async function exportCredentials(work: Work, format: ExportFormat, filters: CredentialFilters): Promise<Download> {
  const body = await bodyOf(work, format, await toCredentialQuery(work, filters))
  return { body, type: types[format], fileName: `${credentialWords[work.actor.language].fileName}-${work.today}.${format}` }
}
