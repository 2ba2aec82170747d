import { stringify } from 'csv-stringify/sync'
import writeXlsxFile, { type SheetData } from 'write-excel-file/node'
import { LEAST_SERVINGS, type ItemFlag } from '#shared/domain/item-review'
import type { ItemKind, Language } from '#shared/domain/states'
import type { ItemReviewLine } from '#shared/schemas/item-review'
import { asPlainCell } from './credential-csv'

interface Words {
  fileName: string
  sheet: string
  columns: string[]
  kinds: Record<ItemKind, string>
  flags: Record<ItemFlag, string>
  yes: string
  right: string
  tooFew: string
}

/** The words of the exported table. */
export const itemReviewWords: Record<Language, Words> = {
  en: {
    fileName: 'question-review', sheet: 'Questions',
    columns: ['Number', 'Question', 'Kind', 'Must-know', 'Lesson', 'Times asked', 'Share right', '95 % from', '95 % to', 'Item-rest', 'Picked', 'Needs a look', 'Taken out because'],
    kinds: { one: 'one of', all: 'all of', order: 'order', number: 'number', place: 'place' },
    flags: { tooEasy: 'too easy', tooHard: 'too hard', doesNotSeparate: 'does not separate', keyMayBeWrong: 'key may be wrong' },
    yes: 'yes', right: 'right', tooFew: `asked fewer than ${LEAST_SERVINGS} times`,
  },
  es: {
    fileName: 'revision-de-preguntas', sheet: 'Preguntas',
    columns: ['Número', 'Pregunta', 'Tipo', 'Indispensable', 'Lección', 'Veces hecha', 'Parte correcta', '95 % desde', '95 % hasta', 'Pregunta-resto', 'Elegidas', 'Hay que verla', 'Retirada porque'],
    kinds: { one: 'una', all: 'varias', order: 'orden', number: 'número', place: 'lugar' },
    flags: { tooEasy: 'muy fácil', tooHard: 'muy difícil', doesNotSeparate: 'no distingue', keyMayBeWrong: 'la clave puede estar mal' },
    yes: 'sí', right: 'correcta', tooFew: `se hizo menos de ${LEAST_SERVINGS} veces`,
  },
}

const rounded = (value: number | null) => (value === null ? null : Math.round(value * 10_000) / 10_000)

function toCells(line: ItemReviewLine, language: Language): (string | number | null)[] {
  const words = itemReviewWords[language]
  const picked = line.options.map(({ id, picks, isRight }) => `${id.toUpperCase()} ${picks}${isRight ? ` (${words.right})` : ''}`).join('; ')
  const reasons = line.served < LEAST_SERVINGS ? words.tooFew : line.flags.map(flag => words.flags[flag]).join('; ')
  return [
    line.id, line.stem, words.kinds[line.kind], line.mustKnow ? words.yes : '', line.lesson.title, line.served,
    line.served === 0 ? null : rounded(line.p), rounded(line.low), rounded(line.high), rounded(line.itemRest), picked, reasons, line.struck?.reason ?? '',
  ]
}

/** A CSV (RFC 4180, UTF-8 with its mark, CRLF): shares from 0 to 1, numbers as numbers, text never a formula. */
export const itemReviewCsv = (lines: readonly ItemReviewLine[], language: Language): string => stringify([
  itemReviewWords[language].columns,
  ...lines.map(line => toCells(line, language).map(cell => (typeof cell === 'string' ? asPlainCell(cell) : cell))),
], { bom: true, record_delimiter: 'windows' })

const cellOf = (value: string | number | null) => {
  if (value === null || value === '') return null
  return typeof value === 'number' ? { value, type: Number } : { value, type: String }
}

/** A workbook of one sheet with a header that stays in view. */
export async function itemReviewSheet(lines: readonly ItemReviewLine[], language: Language): Promise<Buffer> {
  const { columns, sheet } = itemReviewWords[language]
  const data: SheetData = [
    columns.map(value => ({ value, type: String, fontWeight: 'bold' as const })),
    ...lines.map(line => toCells(line, language).map(cellOf)),
  ]
  const widths = [24, 60, 10, 13, 26, 12, 12, 10, 10, 10, 34, 30, 30]
  return writeXlsxFile(data, { sheet, columns: widths.map(width => ({ width })), stickyRowsCount: 1, orientation: 'landscape' }).toBuffer()
}
