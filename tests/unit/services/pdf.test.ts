import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import { expect, it } from 'vitest'
import { renderPdf } from '~~/server/documents/pdf'

it('renders names of many alphabets and counts its pages in the reader\'s language', async () => {
  const bytes = await renderPdf({ content: [{ text: 'Núñez Nguyễn Ђорђе' }, { text: 'second', pageBreak: 'before' }] }, { language: 'es', footNote: 'Hoja' })
  const pdf = await getDocument({ data: new Uint8Array(bytes), verbosity: 0 }).promise
  const texts = await Promise.all([1, 2].map(async number => (await (await pdf.getPage(number)).getTextContent()).items.map(item => 'str' in item ? item.str : '').join(' ')))
  expect(pdf.numPages).toBe(2)
  expect(texts[0]).toContain('Núñez Nguyễn Ђорђе')
  expect(texts[0]).toContain('Página 1 de 2')
  expect(texts[1]).toContain('Hoja')
})

it('fetches nothing from the network', async () => {
  await expect(renderPdf({ content: [{ image: 'http://127.0.0.1:9/picture.png' }] })).rejects.toThrow()
})
