import { stringify } from 'csv-stringify/sync'
import writeXlsxFile, { type SheetData } from 'write-excel-file/node'
import type { Language } from '#shared/domain/states'
import type { TrainingKind } from '#shared/domain/training-minutes'
import type { TrainingLine } from '../data/training-minutes'
import { asPlainCell } from './credential-csv'

type Line = TrainingLine & { title: string }

export const trainingWords: Record<Language, { fileName: string, sheet: string, columns: string[], kinds: Record<TrainingKind, string> }> = {
  en: {
    fileName: 'training-minutes', sheet: 'Training minutes',
    columns: ['Person', 'Badge', 'Employer', 'Crew', 'Date', 'Module', 'What', 'Minutes'],
    kinds: { lesson: 'lessons read', quiz: 'quiz', handsOn: 'hands-on', assessorTalk: 'talk with an assessor' },
  },
  es: {
    fileName: 'minutos-de-capacitacion', sheet: 'Minutos',
    columns: ['Persona', 'Gafete', 'Empresa', 'Cuadrilla', 'Fecha', 'Módulo', 'Qué', 'Minutos'],
    kinds: { lesson: 'lecciones leídas', quiz: 'examen', handsOn: 'práctica', assessorTalk: 'plática con un evaluador' },
  },
}

/** A CSV (RFC 4180, UTF-8 with its mark, CRLF): dates as YYYY-MM-DD, minutes as numbers. */
export const trainingCsv = (lines: Line[], language: Language): string => stringify([
  trainingWords[language].columns,
  ...lines.map(line => [asPlainCell(line.name), asPlainCell(line.badge), asPlainCell(line.employer), asPlainCell(line.crew ?? ''), line.doneOn, line.title, trainingWords[language].kinds[line.kind], line.minutes]),
], { bom: true, record_delimiter: 'windows' })

const textCell = (value: string | null) => (value ? { value, type: String } : null)

/** A workbook of one sheet; dates are dates, text is never a formula. */
export async function trainingSheet(lines: Line[], language: Language): Promise<Buffer> {
  const { columns, sheet, kinds } = trainingWords[language]
  const data: SheetData = [
    columns.map(value => ({ value, type: String, fontWeight: 'bold' as const })),
    ...lines.map(line => [
      textCell(line.name), textCell(line.badge), textCell(line.employer), textCell(line.crew),
      { value: new Date(`${line.doneOn}T00:00:00Z`), type: Date, format: 'yyyy-mm-dd' }, textCell(line.title), textCell(kinds[line.kind]), { value: line.minutes, type: Number },
    ]),
  ]
  return writeXlsxFile(data, { sheet, columns: [26, 12, 24, 18, 13, 26, 20, 10].map(width => ({ width })), stickyRowsCount: 1 }).toBuffer()
}
