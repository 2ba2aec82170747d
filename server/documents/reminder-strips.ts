import type { Content } from 'pdfmake/interfaces'
import type { Language } from '#shared/domain/states'
import { renderPdf } from './pdf'

export interface Strip { name: string, crew: string | null, language: Language, title: string, lines: readonly string[], whatToDo: string }

const words: Record<Language, { note: string, cut: string }> = {
  en: { note: 'Company record, not a licence', cut: 'Cut along the dashes and hand out one each.' },
  es: { note: 'Registro de la empresa, no es una licencia', cut: 'Corte por las rayas y dé una a cada quien.' },
}

/** Paper strips, one a person, each in that person's language, with dashes to cut along: for hands that read no mail. */
export function reminderStrips(strips: readonly Strip[], { language, company, today }: { language: Language, company: string, today: string }): Promise<Buffer> {
  const row = ({ name, crew, title, lines, whatToDo, ...strip }: Strip): Content[] => [{
    margin: [0, 6, 0, 6],
    stack: [
      { columns: [{ text: name, bold: true, fontSize: 14, width: '*' }, { text: crew ?? '', alignment: 'right', width: 'auto' }] },
      { text: title, bold: true, margin: [0, 3, 0, 2] },
      { ul: lines.map(text => ({ text, fontSize: 11 })) },
      { text: `${whatToDo} ${words[strip.language].note}.`, fontSize: 8.5, margin: [0, 4, 0, 0] },
    ],
  }]
  return renderPdf({
    content: [
      { text: `${company}, ${today}. ${words[language].cut}`, fontSize: 8.5, margin: [0, 0, 0, 6] },
      { table: { widths: ['*'], dontBreakRows: true, body: strips.map(row) }, layout: { hLineWidth: () => 1, vLineWidth: () => 0, hLineStyle: () => ({ dash: { length: 5, space: 4 } }) } },
    ],
  }, { language, footNote: company })
}
