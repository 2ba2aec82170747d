import type { Language } from '#shared/domain/states'
import type { TrainingKind } from '#shared/domain/training-minutes'
import type { TrainingLine } from '../data/training-minutes'
import { inOnePiece, type Table } from './table-files'

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

const widths = [26, 12, 24, 18, 13, 26, 20, 10]

/** The lines as a table for payroll: dates as dates, minutes as numbers. */
export function trainingTable(lines: readonly Line[], language: Language): Table {
  const { columns, sheet, fileName, kinds } = trainingWords[language]
  const rows = lines.map(line => ({ cells: [line.name, line.badge, line.employer, line.crew, { date: line.doneOn }, line.title, kinds[line.kind], line.minutes] }))
  return { title: sheet, fileName, columns: columns.map((title, index) => ({ title, width: widths[index]! })), pieces: inOnePiece(rows) }
}
