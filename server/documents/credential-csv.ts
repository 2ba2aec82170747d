import { Readable } from 'node:stream'
import { stringify } from 'csv-stringify'
import type { Language } from '#shared/domain/states'
import type { CredentialItem } from '#shared/schemas/credentials'
import { credentialWords } from './credential-words'

/** Text that a spreadsheet would run: it starts like a formula (also in full-width signs), a command or a control sign. */
const startsLikeFormula = /^[=+\-@\t\r\n\0%|＝＋－＠]/

/** The text with an apostrophe before it where a spreadsheet would take it for a formula. */
export const asPlainCell = (text: string) => startsLikeFormula.test(text) ? `'${text}` : text

const cell = (text: string | null | undefined) => asPlainCell(text ?? '')

const toRow = (item: CredentialItem, language: Language) => [
  cell(item.person), cell(item.badge), cell(item.employer), cell(item.crew), cell(item.typeName[language]), cell(item.number), cell(item.issuer),
  item.issuedOn, item.expiresOn ?? '', item.daysLeft ?? '', credentialWords[language].states[item.state],
]

/** A CSV (RFC 4180, UTF-8 with its mark, CRLF) of a list that arrives in pieces; dates as YYYY-MM-DD, days as numbers. */
export function credentialCsv(pieces: AsyncIterable<CredentialItem[]>, language: Language): Readable {
  const words = credentialWords[language].columns
  async function* rows() {
    yield Object.values(words)
    for await (const piece of pieces) {
      for (const item of piece) yield toRow(item, language)
    }
  }
  return Readable.from(rows()).pipe(stringify({ bom: true, record_delimiter: 'windows', quoted_match: /[\r\n]/ }))
}
