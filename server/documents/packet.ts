import type { Content, TableCell } from 'pdfmake/interfaces'
import type { Language } from '#shared/domain/states'
import type { PacketContents } from '#shared/schemas/packets'
import { packetWords } from './packet-words'
import { renderPdf, ruledTable } from './pdf'

const heads = (columns: readonly string[]): TableCell[] => columns.map(text => ({ text, bold: true }))
const table = (widths: (string | number)[], body: TableCell[][]): Content => ({ layout: ruledTable, margin: [0, 4, 0, 12], fontSize: 8.5, table: { headerRows: 1, keepWithHeaderRows: 1, dontBreakRows: true, widths, body } })
const heading = (text: string): Content => ({ text, bold: true, fontSize: 12, margin: [0, 8, 0, 2] })

/** A packet on paper: people with their duties, credentials in date, the last sheets with where to check them; the disclaimer at every foot. */
export function renderPacket(contents: PacketContents, { hash, language, origin }: { hash: string, language: Language, origin: string }): Promise<Buffer> {
  const words = packetWords[language]
  const { site, people, sheets, parts } = contents
  const dutiesOf = (person: PacketContents['people'][number]) => person.duties.map(duty => `${duty.name[language]}${duty.until ? ` (${words.until(duty.until)})` : ''}`).join(', ') || words.nothing
  const cards = people.flatMap(person => person.credentials.map((card): TableCell[] => [{ text: person.name, bold: true }, card.name[language], words.basis[card.basis], card.issuer ?? '', card.issuedOn, card.expiresOn ?? words.noExpiry]))
  return renderPdf({
    info: { title: `${words.title(site.name)} · ${contents.company}` },
    content: [
      { text: words.title(site.name), bold: true, fontSize: 17 },
      { text: [contents.company, site.address].filter(Boolean).join(' · '), margin: [0, 2, 0, 2] },
      { text: words.made(contents.madeOn, contents.madeBy) },
      { text: words.note, margin: [0, 6, 0, 6] },
      heading(words.people(people.length)),
      table(parts.includes('duties') ? [110, 110, 80, '*'] : [150, '*', 100], [
        heads(parts.includes('duties') ? words.columns : words.columns.slice(0, 3)),
        ...people.map((person): TableCell[] => [{ text: person.name, bold: true }, [person.employer, person.trade].filter(Boolean).join(', '), person.crew ?? '', ...(parts.includes('duties') ? [dutiesOf(person)] : [])]),
      ]),
      ...(parts.includes('credentials') ? [heading(words.credentials), table([100, '*', 46, 90, 52, 52], [heads(words.cardColumns), ...cards])] : []),
      ...(parts.includes('sheets')
        ? [heading(words.sheets(sheets.length)), table([52, '*', 90, 36, 170], [heads(words.sheetColumns), ...sheets.map((sheet): TableCell[] => [sheet.date, sheet.talk[language], sheet.runBy, { text: String(sheet.count), alignment: 'right' }, { text: `${origin}/check/${sheet.hash}`, fontSize: 6 }])])]
        : []),
      { text: `${words.hash}: ${hash}`, fontSize: 7, margin: [0, 6, 0, 0] },
    ],
  }, { language, footNote: `${contents.company} · ${site.name} · ${contents.madeOn} · ${words.foot}` })
}
