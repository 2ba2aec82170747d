import type { Column } from 'pdfmake/interfaces'
import { renderPdf } from './pdf'
import { qrSvg } from './qr'

interface PosterSite { code: string, name: string, address: string | null, company: string, url: string }

const millimetre = 72 / 25.4

/** A printed QR of 120 mm keeps its modules far above the 2 mm that a poster needs, for links of any usual length. */
const qrSide = 120 * millimetre

const steps = {
  en: { title: 'Morning briefing', lines: ['Scan this with your phone at the talk.', 'Type the six digits that the foreman shows.', 'Tap “I heard it”.'], help: 'No phone? Sign on the foreman\'s, or on paper.' },
  es: { title: 'Plática de la mañana', lines: ['Escanee esto con su teléfono en la plática.', 'Escriba los seis números que muestra el mayordomo.', 'Toque «La escuché».'], help: '¿Sin teléfono? Firme en el del mayordomo o en papel.' },
} as const

function column(language: 'en' | 'es'): Column {
  const { title, lines, help } = steps[language]
  return {
    width: '*',
    stack: [
      { text: title, bold: true, fontSize: 15, margin: [0, 0, 0, 4] },
      { ol: lines.map(text => ({ text, margin: [0, 0, 0, 3] })), fontSize: 12 },
      { text: help, fontSize: 10.5, margin: [0, 4, 0, 0] },
    ],
  }
}

/** The poster that hangs at the gate: one page, black on white, the same QR for every day, both languages. */
export async function renderPoster({ code, name, address, company, url }: PosterSite): Promise<Buffer> {
  return renderPdf({
    info: { title: `${name}: ${steps.en.title}` },
    content: [
      { text: name, bold: true, fontSize: 30, alignment: 'center', lineHeight: 1 },
      { text: [company, address].filter(Boolean).join(' · '), fontSize: 11, alignment: 'center', margin: [0, 4, 0, 6] },
      { svg: await qrSvg(url), width: qrSide, alignment: 'center' },
      { text: url, bold: true, fontSize: 14, alignment: 'center', margin: [0, 6, 0, 2] },
      { text: code, fontSize: 11, font: 'DejaVuMono', alignment: 'center', margin: [0, 0, 0, 14] },
      { columns: [column('en'), column('es')], columnGap: 28 },
    ],
  }, { footNote: `Pourwright · ${company}` })
}
