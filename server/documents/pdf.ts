import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import pdfmake from 'pdfmake'
import type { TDocumentDefinitions } from 'pdfmake/interfaces'
import type { Language } from '#shared/domain/states'

/**
 * DejaVu covers the names on our rosters (Spanish, Vietnamese, Greek, Cyrillic); the web font does not.
 * The build copies these files beside the server (`externals.traceInclude` in nuxt.config.ts).
 */
function fontFolder(): string {
  return join(dirname(createRequire(import.meta.url).resolve('dejavu-fonts-ttf/package.json')), 'ttf')
}

let isReady = false

function prepare(): void {
  if (isReady) return
  const font = (name: string) => join(fontFolder(), `${name}.ttf`)
  pdfmake.setFonts({
    DejaVu: { normal: font('DejaVuSansCondensed'), bold: font('DejaVuSansCondensed-Bold'), italics: font('DejaVuSansCondensed'), bolditalics: font('DejaVuSansCondensed-Bold') },
    DejaVuMono: { normal: font('DejaVuSansMono'), bold: font('DejaVuSansMono'), italics: font('DejaVuSansMono'), bolditalics: font('DejaVuSansMono') },
  })
  // Documents are made from our own data only: no picture from the network, no file but the fonts.
  pdfmake.setUrlAccessPolicy(() => false)
  const folder = fontFolder()
  pdfmake.setLocalAccessPolicy(path => path.startsWith(folder))
  isReady = true
}

const pageOf: Record<Language, (page: number, pages: number) => string> = {
  en: (page, pages) => `Page ${page} of ${pages}`,
  es: (page, pages) => `Página ${page} de ${pages}`,
}

/** A thin line over and under every row, none upright: reads well in black and white. */
export const ruledTable = {
  hLineWidth: () => 0.5,
  vLineWidth: () => 0,
  hLineColor: () => '#7A7C78',
  paddingTop: () => 4,
  paddingBottom: () => 4,
}

export interface PdfOptions {
  language?: Language
  /** Words at the left of every page's foot: what this paper is, its hash, its date. */
  footNote?: string
}

/**
 * Renders a pdfmake definition to bytes: US letter with margins that A4 keeps too, DejaVu, and "page x of y" at
 * the foot unless the definition brings its own. Keep it outside transactions: it holds the only thread for about
 * 2 ms a row.
 */
export async function renderPdf(definition: TDocumentDefinitions, options: PdfOptions = {}): Promise<Buffer> {
  prepare()
  const { language = 'en', footNote = '' } = options
  return pdfmake.createPdf({
    pageSize: 'LETTER',
    pageMargins: [48, 48, 48, 60],
    language: language === 'es' ? 'es-US' : 'en-US',
    footer: (page, pages) => ({
      margin: [48, 14, 48, 0],
      fontSize: 7.5,
      columns: [{ text: footNote, width: '*' }, { text: pageOf[language](page, pages), width: 'auto', alignment: 'right' }],
    }),
    ...definition,
    info: { creator: 'Pourwright', producer: 'Pourwright', ...definition.info },
    defaultStyle: { font: 'DejaVu', fontSize: 9.5, lineHeight: 1.15, color: '#1E2529', ...definition.defaultStyle },
  }).getBuffer()
}
