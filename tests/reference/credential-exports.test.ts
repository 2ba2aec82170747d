import { execFileSync } from 'node:child_process'
import { mkdtempSync, writeFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { buffer } from 'node:stream/consumers'
import type { Readable } from 'node:stream'
import { BinaryBitmap, HybridBinarizer, QRCodeReader, RGBLuminanceSource } from '@zxing/library'
import { parse } from 'csv-parse/sync'
import ICAL from 'ical.js'
import jsqr from 'jsqr'
import { readSheet } from 'read-excel-file/node'
import sharp from 'sharp'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { CredentialFilters } from '#shared/schemas/credentials'
import type { Db } from '../../server/data/database'
import { exportCredentials } from '../../server/services/credential-export'
import type { ExportFormat } from '#shared/schemas/common'
import { makeCardPdf } from '../../server/services/cards'
import { asPlainCell } from '../../server/documents/table-files'
import { hold, openCredentialCompany, workOf } from '../support/credential-company'

let db: Db
const ids: Record<string, string> = {}
const filters: CredentialFilters = { within: 60, includeExpired: true, sort: 'expiresOn' }

beforeAll(async () => {
  db = await openCredentialCompany()
  ids.expired = await hold(db, { type: 'lift-truck', issuedOn: '2023-11-28', expiresOn: '2026-11-28', number: '=HYPERLINK("x")' })
  ids.due = await hold(db, { issuedOn: '2025-01-30', expiresOn: '2027-01-30', issuer: 'Red Barn,\n"First" Aid; ñ', number: '0042' })
  ids.ines = await hold(db, { personId: 'ines', issuedOn: '2024-12-15', expiresOn: '2026-12-15' })
  await hold(db, { personId: 'ines', type: 'ladders' })
})
afterAll(() => db.destroy())

const exported = async (format: ExportFormat, who: 'sam' = 'sam', chosen = filters) => exportCredentials(await workOf(db, who), format, chosen)

test('CSV reads back in another parser, with its mark, quoted line breaks and no formula', async () => {
  const { body, fileName } = await exported('csv')
  const raw = (await buffer(body as Readable)).toString('utf8')
  expect(fileName).toBe('credentials-2026-12-01.csv')
  expect(raw.startsWith('\uFEFFPerson,Badge,')).toBe(true)
  expect(raw.split('\r\n').length).toBe(5)
  const rows: Record<string, string>[] = parse(raw, { bom: true, columns: true, record_delimiter: '\r\n' })
  expect(rows.map(row => [row.Person, row.Credential, row['Expires on'], row['Days left'], row.State])).toEqual([
    ['Hal Hand', 'Lift truck evaluation', '2026-11-28', '-3', 'expired'],
    ['Inés Quispe', 'First aid and CPR', '2026-12-15', '14', 'due soon'],
    ['Hal Hand', 'First aid and CPR', '2027-01-30', '60', 'due soon'],
  ])
  expect(rows[0]!.Number).toBe('\'=HYPERLINK("x")')
  expect(rows[2]).toMatchObject({ Number: '0042', Issuer: 'Red Barn,\n"First" Aid; ñ', Crew: 'North', Employer: 'Test Walls' })
})

test.each(['=1', '+1', '-1', '@x', '\tx', '\rx', '\nx', '\0x', '＝1', '＋1', '－1', '＠x', '|x', '%x'])('%j gets an apostrophe, so that no spreadsheet runs it', (cell) => {
  expect(asPlainCell(cell)).toBe(`'${cell}`)
  expect(asPlainCell(`a${cell}`)).toBe(`a${cell}`)
})

test('XLSX reads back with dates as dates and the days as numbers', async () => {
  const { body } = await exported('xlsx')
  const [header, ...rows] = await readSheet(body as Buffer)
  expect(header).toEqual(['Person', 'Badge', 'Employer', 'Crew', 'Credential', 'Number', 'Issuer', 'Issued on', 'Expires on', 'Days left', 'State'])
  expect(rows).toHaveLength(3)
  expect(rows[0]![8]).toEqual(new Date('2026-11-28T00:00:00Z'))
  expect(rows[0]![5]).toBe('=HYPERLINK("x")')
  expect(rows[2]!.slice(5, 11)).toEqual(['0042', 'Red Barn,\n"First" Aid; ñ', new Date('2025-01-30T00:00:00Z'), new Date('2027-01-30T00:00:00Z'), 60, 'due soon'])
})

describe('iCalendar', () => {
  test('reads back as one all-day event a renewal, warned of 30 days before, under an id that stays', async () => {
    const { body } = await exported('ics')
    const raw = body as string
    expect(raw.split('\r\n').every(line => Buffer.byteLength(line) <= 75)).toBe(true)
    expect(raw).not.toMatch(/[^\r]\n/)
    expect(raw).not.toContain('RRULE')
    const events = new ICAL.Component(ICAL.parse(raw)).getAllSubcomponents('vevent')
    expect(events.map(event => new ICAL.Event(event)).map(event => [event.uid, event.startDate.isDate, event.startDate.toString(), event.summary])).toEqual([
      [`credential-${ids.expired}@pourwright`, true, '2026-11-28', 'Lift truck evaluation expires: Hal Hand'],
      [`credential-${ids.ines}@pourwright`, true, '2026-12-15', 'First aid and CPR expires: Inés Quispe'],
      [`credential-${ids.due}@pourwright`, true, '2027-01-30', 'First aid and CPR expires: Hal Hand'],
    ])
    const alarm = events[0]!.getFirstSubcomponent('valarm')!
    expect(String(alarm.getFirstPropertyValue('trigger'))).toBe('-P30D')
  })

  test('keeps the days in any zone of the machine', async () => {
    const zone = process.env.TZ
    const days = []
    for (const TZ of ['UTC', 'America/New_York', 'Asia/Tokyo']) {
      process.env.TZ = TZ
      days.push(((await exported('ics')).body as string).match(/DTSTART;VALUE=DATE:\d{8}/g))
    }
    process.env.TZ = zone
    expect(days).toEqual(Array(3).fill(['DTSTART;VALUE=DATE:20261128', 'DTSTART;VALUE=DATE:20261215', 'DTSTART;VALUE=DATE:20270130']))
  })
})

async function pdfText(bytes: Buffer): Promise<string> {
  const require = createRequire(import.meta.url)
  const { getDocument } = await import('pdfjs-dist/legacy/build/pdf.mjs')
  const fonts = join(require.resolve('pdfjs-dist/package.json'), '../standard_fonts/')
  const document = await getDocument({ data: new Uint8Array(bytes), standardFontDataUrl: fonts }).promise
  const pages = []
  for (let number = 1; number <= document.numPages; number++) {
    const content = await (await document.getPage(number)).getTextContent()
    pages.push(content.items.map(item => ('str' in item ? item.str : '')).join(' '))
  }
  return pages.join('\n').replace(/\s+/g, ' ')
}

test('PDF reads back with every line, its state in words, and says what it is', async () => {
  const content = await pdfText((await exported('pdf')).body as Buffer)
  for (const said of ['Test Walls', 'State on 2026-12-01', '3 in all', 'Hal Hand', 'Inés Quispe', 'Lift truck evaluation', '2026-11-28', 'expired', 'due soon', 'Company record, not a licence', 'Page 1 of 1']) expect(content).toContain(said)
})

describe('the wallet card', () => {
  const decoders = {
    jsqr: (pixels: Uint8ClampedArray, width: number, height: number) => jsqr(pixels, width, height)?.data,
    zxing: (pixels: Uint8ClampedArray, width: number, height: number) => {
      const grey = new Uint8ClampedArray(width * height).map((_, index) => pixels[index * 4]!)
      return new QRCodeReader().decode(new BinaryBitmap(new HybridBinarizer(new RGBLuminanceSource(grey, width, height)))).getText()
    },
  }
  const rasterised = async (bytes: Buffer) => {
    const folder = mkdtempSync(join(tmpdir(), 'pourwright-card-'))
    writeFileSync(join(folder, 'card.pdf'), bytes)
    execFileSync('pdftoppm', ['-png', '-r', '300', '-singlefile', join(folder, 'card.pdf'), join(folder, 'card')])
    const { data, info } = await sharp(join(folder, 'card.png')).ensureAlpha().raw().toBuffer({ resolveWithObject: true })
    return { pixels: new Uint8ClampedArray(data), width: info.width, height: info.height }
  }

  test.each(Object.keys(decoders) as (keyof typeof decoders)[])('its printed code leads %s to the check page', async (name) => {
    const { body } = await makeCardPdf(await workOf(db, 'hal'), ids.due!, 'https://walls.example')
    const { pixels, width, height } = await rasterised(body)
    expect(decoders[name](pixels, width, height)).toBe(`HTTPS://WALLS.EXAMPLE/VERIFY/CARD${ids.due!.toUpperCase()}`)
  })

  test('says the holder, the dates, the link in words, and that it is no licence', async () => {
    const content = await pdfText((await makeCardPdf(await workOf(db, 'hal'), ids.due!, 'https://walls.example')).body)
    for (const said of ['Hal Hand', 'First aid and CPR', '2027-01-30', 'Company record, not a licence', `https://walls.example/verify/CARD${ids.due!.toUpperCase()}`]) expect(content).toContain(said)
  })
})
