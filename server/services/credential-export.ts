import type { ExportFormat } from '#shared/schemas/common'
import type { Language } from '#shared/domain/states'
import { daysLeft } from '#shared/domain/validity'
import type { CredentialFilters } from '#shared/schemas/credentials'
import { listVersions } from '../data/credentials'
import type { Db } from '../data/database'
import { listCredentialIds, listCredentialLines, type CredentialLine, type CredentialQuery } from '../data/views/credential-list'
import { credentialWords } from '../documents/credential-words'
import { tableCalendar, type Table, type TableRow } from '../documents/table-files'
import { toCredentialQuery } from './credentials'
import { allRows, exportTable, type Download } from './table-export'
import type { Work } from './work'

/** Lines read at once: enough that asking costs little beside the answer, little enough that others are answered in between. */
const pieceSize = 1000
const widths = [26, 12, 24, 18, 30, 18, 24, 13, 13, 11, 16]
const warnDays = 30

function toRow(item: CredentialLine, { today, language, version }: { today: string, language: Language, version: number | null }): TableRow {
  const words = credentialWords[language]
  const credential = item.typeName
  const cells = [
    item.person, item.badge, item.employer, item.crew, credential, item.number, item.issuer,
    { date: item.issuedOn }, item.expiresOn && { date: item.expiresOn }, daysLeft(item.expiresOn, today), words.states[item.state],
  ]
  if (version === null || item.expiresOn === null) return { cells }
  return { cells, event: {
    id: `credential-${item.id}`, sequence: version - 1, on: item.expiresOn, summary: words.runsOut(credential, item.person),
    description: [words.states[item.state], `${words.columns.employer}: ${item.employer}`, item.source].join('\n'), warning: { days: warnDays, text: words.runsOutSoon(credential, item.person) },
  } }
}

async function* inPieces(db: Db, ids: string[], { today, language, isCalendar }: { today: string, language: Language, isCalendar: boolean }): AsyncGenerator<TableRow[]> {
  for (let start = 0; start < ids.length; start += pieceSize) {
    const piece = ids.slice(start, start + pieceSize)
    const versions = isCalendar ? await listVersions(db, piece) : new Map<string, number>()
    yield (await listCredentialLines(db, piece, { today, language })).map(item => toRow(item, { today, language, version: isCalendar ? versions.get(item.id) ?? 1 : null }))
  }
}

async function toTable(db: Db, query: CredentialQuery, { language, isCalendar }: { language: Language, isCalendar: boolean }): Promise<Table> {
  const { title, fileName, columns, companyRecord } = credentialWords[language]
  const ids = await listCredentialIds(db, query, language)
  return { title, fileName, columns: Object.values(columns).map((column, index) => ({ title: column, width: widths[index]! })), pieces: inPieces(db, ids, { today: query.today, language, isCalendar }), footNote: companyRecord }
}

/** The renewals of a query as an iCalendar text. */
export async function calendarOf({ db, now, company }: Pick<Work<null>, 'db' | 'now' | 'company'>, query: CredentialQuery, language: Language): Promise<string> {
  const table = await toTable(db, query, { language, isCalendar: true })
  return tableCalendar(table, await allRows(table.pieces, Number.POSITIVE_INFINITY), { language, company: company.name, today: query.today, now })
}

/** The whole filtered list in one of four formats, in the reader's language. CSV is written while the database is read. */
export async function exportCredentials(work: Work, format: ExportFormat, filters: CredentialFilters): Promise<Download> {
  return exportTable(work, format, await toTable(work.db, await toCredentialQuery(work, filters), { language: work.actor.language, isCalendar: format === 'ics' }))
}
