import type { Content } from 'pdfmake/interfaces'
import type { Language } from '#shared/domain/states'
import type { CredentialItem } from '#shared/schemas/credentials'
import { credentialWords } from './credential-words'
import { renderPdf, ruledTable } from './pdf'

interface PaperOptions { language: Language, company: string, today: string }

const toRow = (item: CredentialItem, language: Language): Content[] => [
  { text: item.person, bold: true }, item.badge, item.employer, item.crew ?? '', item.typeName[language], [item.number, item.issuer].filter(Boolean).join(' · '),
  item.issuedOn, item.expiresOn ?? credentialWords[language].noExpiry, { text: item.daysLeft === null ? '' : String(item.daysLeft), alignment: 'right' }, credentialWords[language].states[item.state],
]

/** The list on paper: landscape letter, header row on every page, the state in words so that it survives a copier. */
export function credentialPaper(items: CredentialItem[], { language, company, today }: PaperOptions): Promise<Buffer> {
  const words = credentialWords[language]
  const { person, badge, employer, crew, credential, number, issuer, issuedOn, expiresOn, daysLeft, state } = words.columns
  const heads = [person, badge, employer, crew, credential, `${number} · ${issuer}`, issuedOn, expiresOn, daysLeft, state]
  const body: Content[][] = [heads.map(text => ({ text, bold: true })), ...items.map(item => toRow(item, language))]
  return renderPdf({
    pageOrientation: 'landscape',
    info: { title: `${words.title} · ${company}` },
    defaultStyle: { fontSize: 8 },
    content: [
      { text: `${company}: ${words.title.toLowerCase()}`, fontSize: 15, bold: true },
      { text: `${words.madeOn(today)} · ${words.count(items.length)}`, margin: [0, 2, 0, 10] },
      { table: { headerRows: 1, dontBreakRows: true, widths: ['*', 40, 80, 60, 110, 100, 54, 54, 36, 56], body }, layout: ruledTable },
    ],
  }, { language, footNote: `${company} · ${words.companyRecord}` })
}
