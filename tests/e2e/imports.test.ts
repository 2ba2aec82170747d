import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import writeXlsxFile from 'write-excel-file/node'
import { signedIn } from '../support/client'
import { desk, openBrowser, openDevice, visit } from '../support/browser'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(async () => {
  await (await signedIn('office')).patch('/api/session', { language: 'en' })
  await browser.close()
})

async function openImports(language: 'en' | 'es' = 'en') {
  await (await signedIn('office')).patch('/api/session', { language })
  const device = await openDevice(browser, { size: desk, language })
  expect((await device.context.request.post(`${device.origin}/api/session`, { data: { email: 'office@cedarhollow.example', password: 'running-bond' }, headers: { origin: device.origin } })).status()).toBe(200)
  await visit(device.page, '/imports')
  return device
}

/** A list of people as an old spreadsheet of a Mexican office writes it: windows-1252, a title on top, semicolons, one column nobody knows. */
const people = Buffer.from(['Personal 2026;;;;', 'Apellidos;Nombres;Clave interna;Fecha de ingreso;Cuadrilla', 'Zu\xF1iga Le\xF3n;Mar\xEDa;Z901;3/4/2026;', 'Zapata;Hugo;Z902;5/6/2026;No existe'].join('\r\n'), 'latin1')

test('a nasty list of people: its unknown column is named once, its dates are asked about, its bad row is told in Spanish, and the next file needs no asking', async () => {
  const { page, context, complaints } = await openImports('es')
  const file = page.getByLabel('Archivo', { exact: true })
  await file.setInputFiles({ name: 'personal.csv', mimeType: 'text/csv', buffer: people })
  await page.getByRole('button', { name: 'Revisar antes de importar' }).click()
  await page.getByRole('heading', { name: 'Columnas como se entendieron' }).waitFor()
  await page.getByLabel(/^Clave interna/).selectOption({ label: 'gafete' })
  await page.getByText('Puede ser dos fechas').first().waitFor()
  await page.getByLabel('¿Cómo están escritas las fechas?').selectOption('dmy')
  await page.getByRole('button', { name: 'Revisar antes de importar' }).click()
  await page.getByText('No hay tal cuadrilla.').waitFor()
  await page.getByRole('checkbox').check()
  await page.getByRole('button', { name: 'Guardar 1 fila' }).click()
  await page.getByRole('heading', { name: 'Guardado' }).waitFor()
  const office = await signedIn('office')
  const found = (await office.get<{ items: { id: string, name: string, hiredOn: string }[] }>('/api/people?q=Z901')).body.items
  expect(found).toHaveLength(1)
  expect(found[0]!.name).toBe('María Zuñiga León')
  expect((await office.get<{ hiredOn: string }>(`/api/people/${found[0]!.id}`)).body.hiredOn).toBe('2026-04-03')

  await file.setInputFiles({ name: 'mas.csv', mimeType: 'text/csv', buffer: Buffer.from('Clave interna,Nombre\nZ903,Luz Vega') })
  await page.getByRole('button', { name: 'Revisar antes de importar' }).click()
  await page.getByRole('button', { name: 'Guardar 1 fila' }).waitFor()
  expect(complaints.filter(text => !text.includes('422'))).toEqual([])
  await context.close()
})

test('a nasty workbook of cards: Excel dates, another order, a stranger and a module card are told by row, and the good ones wait to be verified', async () => {
  const { page, context, complaints } = await openImports()
  const day = (iso: string) => ({ value: new Date(`${iso}T00:00:00Z`), type: Date, format: 'm/d/yyyy' })
  const rows = [
    ['Training record'], [],
    ['Expiration date', 'Course', 'Employee number', 'Completed'].map(value => ({ value })),
    [day('2028-03-01'), { value: 'First aid and CPR' }, { value: '2041' }, day('2026-03-01')],
    [null, { value: 'Ladders' }, { value: '2041' }, { value: 46082, type: Number }],
    [day('2028-03-01'), { value: 'First aid and CPR' }, { value: '99999' }, day('2026-03-01')],
    [null, { value: 'Stacking' }, { value: '2041' }, day('2026-03-01')],
  ].map(row => row.map(cell => (typeof cell === 'string' ? { value: cell } : cell)))
  const buffer = await writeXlsxFile(rows, {}).toBuffer()
  await page.getByLabel('What is in the file?').selectOption('credentials')
  await page.getByLabel('File', { exact: true }).setInputFiles({ name: 'cards.xlsx', mimeType: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet', buffer })
  await page.getByRole('button', { name: 'Check before importing' }).click()
  await page.getByText('Nobody has it.').waitFor()
  await page.getByText('This is only issued by passing its module.').waitFor()
  expect(await page.getByRole('button', { name: /^Save 2 rows/ }).isDisabled()).toBe(true)
  await page.getByRole('checkbox').check()
  await page.getByRole('button', { name: 'Save 2 rows' }).click()
  await page.getByRole('heading', { name: 'Saved' }).waitFor()
  const safety = await signedIn('safety')
  const person = (await safety.get<{ items: { id: string }[] }>('/api/people?q=2041')).body.items[0]!
  const cards = (await safety.get<{ items: { type: string, issuedOn: string, expiresOn: string | null }[] }>(`/api/credentials?person=${person.id}&state=unverified`)).body.items
  expect(cards.map(card => [card.type, card.issuedOn, card.expiresOn]).sort()).toEqual([['first-aid-cpr', '2026-03-01', '2028-03-01'], ['ladders', '2026-03-01', null]])
  expect(complaints.filter(text => !text.includes('422'))).toEqual([])
  await context.close()
})
