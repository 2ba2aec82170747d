import { LEAST_SERVINGS, type ItemFlag } from '#shared/domain/item-review'
import type { ItemKind, Language } from '#shared/domain/states'
import type { ItemReviewLine } from '#shared/schemas/item-review'
import { inOnePiece, type Table } from './table-files'

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

const widths = [24, 60, 10, 13, 26, 12, 12, 10, 10, 10, 34, 30, 30]

/** The review as a table: shares from 0 to 1, numbers as numbers. */
export function itemReviewTable(lines: readonly ItemReviewLine[], language: Language): Table {
  const { columns, sheet, fileName } = itemReviewWords[language]
  return { title: sheet, fileName, columns: columns.map((title, index) => ({ title, width: widths[index]! })), pieces: inOnePiece(lines.map(line => ({ cells: toCells(line, language) }))) }
}
