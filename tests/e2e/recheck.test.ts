import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { signedIn } from '../support/client'
import { hydrated, openBrowser, openDevice, phone, visit } from '../support/browser'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

const textOf = async (client: Awaited<ReturnType<typeof signedIn>>, path: string) => Buffer.from(await (await fetch(client.origin + path, { headers: { cookie: [...client.cookies].map(pair => pair.join('=')).join('; ') } })).arrayBuffer())

test('a stranger\'s phone checks a card with signal by its code, and without signal by its signed file; a sheet too, and a changed one is found', async () => {
  const installer = await signedIn('installer')
  const card = (await installer.get<{ items: { id: string, state: string }[] }>('/api/credentials?state=inDate')).body.items[0]!
  const code = (await installer.get<{ cardCode: string }>(`/api/credentials/${card.id}`)).body.cardCode
  const token = await textOf(installer, `/api/credentials/${card.id}/card.jwt`)
  const foreman = await signedIn('foreman')
  const site = (await foreman.get<{ sites: { id: string }[] }>('/api/session/sites')).body.sites[0]!
  const briefing = (await foreman.get<{ items: { id: string, state: string }[] }>(`/api/briefings?site=${site.id}`)).body.items.find(one => one.state === 'sealed')!
  const sheet = await textOf(foreman, `/api/briefings/${briefing.id}/sheet.json`)

  const { page, context, complaints } = await openDevice(browser, { size: phone, language: 'es' })
  await visit(page, `/verify/${code}`)
  await page.getByRole('heading', { level: 1, name: 'Vale hoy' }).waitFor()
  await page.getByRole('link', { name: 'Revisar un archivo sin señal' }).click()
  await page.getByRole('heading', { level: 1, name: 'Revise usted una tarjeta o una hoja' }).waitFor()
  await page.evaluate(() => navigator.serviceWorker.ready.then(() => undefined))
  await page.reload()
  await page.waitForLoadState('networkidle')
  expect(complaints).toEqual([])

  await context.setOffline(true)
  await page.reload()
  await hydrated(page)
  const file = page.getByLabel('Archivo')
  await file.setInputFiles({ name: 'card.jwt', mimeType: 'application/jwt', buffer: token })
  await page.getByRole('heading', { name: 'La tarjeta es auténtica y está vigente' }).waitFor()
  await page.getByText('La clave actual de Cedar Hollow Walls').waitFor()
  await file.setInputFiles({ name: 'sheet.json', mimeType: 'application/json', buffer: sheet })
  await page.getByRole('heading', { name: 'La hoja está como se selló' }).first().waitFor()
  const changed = sheet.toString('utf8').replace(/"name":"([^"]+)"/, '"name":"Nobody Atall"')
  expect(changed).not.toBe(sheet.toString('utf8'))
  await file.setInputFiles({ name: 'sheet.json', mimeType: 'application/json', buffer: Buffer.from(changed) })
  await page.getByRole('heading', { name: 'No es auténtica: se cambió, o la clave no corresponde' }).first().waitFor()
  await file.setInputFiles({ name: 'photo.jpg', mimeType: 'image/jpeg', buffer: Buffer.from([0xFF, 0xD8, 0xFF]) })
  await page.getByRole('heading', { name: 'Esto no es tarjeta ni hoja' }).waitFor()
  await context.close()
})
