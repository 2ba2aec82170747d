import QRCode from 'qrcode'
import type { Content } from 'pdfmake/interfaces'
import type { Language } from '#shared/domain/states'
import type { CredentialItem } from '#shared/schemas/credentials'
import { credentialWords } from './credential-words'
import { renderPdf } from './pdf'

/** A wallet card in points: 3.375 in by 2.125 in (ISO/IEC 7810 ID-1). */
const card = { width: 243, height: 153 }
const qrSide = 88

interface CardOptions { language: Language, company: string, code: string, url: string, today: string }

/** A code in groups of six, as it is read aloud. */
export const spacedCode = (code: string) => code.replace(/(.{6})(?=.)/g, '$1-')

/** The link in capitals needs the smaller alphanumeric symbol; level Q, quiet zone of four modules drawn with it. */
const qrOf = (url: string) => QRCode.toString(url.toUpperCase(), { type: 'svg', errorCorrectionLevel: 'Q', margin: 4 })

function linesOf(item: CredentialItem, { language, company }: CardOptions): Content[] {
  const words = credentialWords[language]
  const row = (label: string, value: string): Content => ({ text: [{ text: `${label}: ` }, { text: value, bold: true }], fontSize: 7, margin: [0, 1, 0, 0] })
  return [
    { text: company, fontSize: 7.5 },
    { text: item.person, bold: true, fontSize: 11, margin: [0, 2, 0, 0] },
    { text: item.typeName[language], bold: true, fontSize: 9, margin: [0, 1, 0, 3] },
    row(words.columns.issuedOn, item.issuedOn),
    row(words.columns.expiresOn, item.expiresOn ?? words.noExpiry),
    ...(item.site ? [row(words.basis.site, item.site)] : []),
    ...(item.number ? [row(words.columns.number, item.number.slice(0, 24))] : []),
  ]
}

/** One wallet card to cut out, black on white, with its code as a QR and in words. It says that it is no licence. */
export async function walletCard(item: CredentialItem, options: CardOptions): Promise<Buffer> {
  const words = credentialWords[options.language]
  const face: Content = {
    table: { widths: [card.width - qrSide - 20, qrSide], heights: [card.height - 48], body: [[{ stack: linesOf(item, options), margin: [4, 4, 0, 0] }, { svg: await qrOf(options.url), width: qrSide, margin: [0, 2, 0, 0] }]] },
    layout: 'noBorders',
  }
  const foot: Content = { stack: [
    { text: `${words.code}: ${spacedCode(options.code)}`, font: 'DejaVuMono', fontSize: 7 },
    { text: `${words.checkAt} ${options.url}`, fontSize: 5.5, margin: [0, 1, 0, 0] },
    { text: words.companyRecord, bold: true, fontSize: 6.5, margin: [0, 1, 0, 0] },
  ], margin: [4, 0, 4, 4] }
  return renderPdf({
    info: { title: `${words.card}: ${item.typeName[options.language]}` },
    content: [{ table: { widths: [card.width], dontBreakRows: true, body: [[{ stack: [face, foot] }]] } }],
  }, { language: options.language, footNote: `${options.company} · ${options.today}` })
}
