import writeXlsxFile, { type SheetData } from 'write-excel-file/node'
import type { Language } from '#shared/domain/states'
import type { CredentialItem } from '#shared/schemas/credentials'
import { credentialWords } from './credential-words'

const widths = [26, 12, 24, 18, 30, 18, 24, 13, 13, 11, 16]

const dateCell = (date: string | null) => date === null ? null : { value: new Date(`${date}T00:00:00Z`), type: Date, format: 'yyyy-mm-dd' }
const textCell = (text: string | null | undefined) => text ? { value: text, type: String } : null

const toRow = (item: CredentialItem, language: Language) => [
  textCell(item.person), textCell(item.badge), textCell(item.employer), textCell(item.crew), textCell(item.typeName[language]), textCell(item.number), textCell(item.issuer),
  dateCell(item.issuedOn), dateCell(item.expiresOn), item.daysLeft === null ? null : { value: item.daysLeft, type: Number }, textCell(credentialWords[language].states[item.state]),
]

/** A workbook of one sheet with a header that stays in view; dates are dates, text is never a formula. */
export async function credentialSheet(items: CredentialItem[], language: Language): Promise<Buffer> {
  const { columns, title } = credentialWords[language]
  const header = Object.values(columns).map(value => ({ value, type: String, fontWeight: 'bold' as const }))
  const data: SheetData = [header, ...items.map(item => toRow(item, language))]
  return writeXlsxFile(data, { sheet: title, columns: widths.map(width => ({ width })), stickyRowsCount: 1, orientation: 'landscape' }).toBuffer()
}
