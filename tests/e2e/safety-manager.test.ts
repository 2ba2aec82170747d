import { readFileSync } from 'node:fs'
import Database from 'better-sqlite3'
import { parse } from 'csv-parse/sync'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, inject, test } from 'vitest'
import { axeFindings, desk, hydrated, narrow, openBrowser, openDevice, sidewaysScroll, visit } from '../support/browser'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function openAs(who: string, size = desk, language: 'en' | 'es' = 'en') {
  const device = await openDevice(browser, { size, language })
  const answer = await device.context.request.post(`${device.origin}/api/session`, { data: { email: `${who}@cedarhollow.example`, password: 'running-bond' }, headers: { origin: device.origin } })
  expect(answer.status()).toBe(200)
  return device
}

test('the safety manager finds what expires, narrows it, takes it along and sends the reminders', async () => {
  const { page, complaints, context } = await openAs('safety')
  await visit(page, '/credentials')
  const heading = page.getByRole('heading', { level: 1 })
  expect(await heading.textContent()).toMatch(/^\d+ expire by January 30$/)
  const rows = page.locator('tbody tr')
  const before = await rows.count()
  expect(before).toBeGreaterThan(5)

  await page.getByLabel('Credential', { exact: true }).selectOption('respirator-fit')
  await page.waitForURL(/type=respirator-fit/)
  await page.waitForFunction(count => document.querySelectorAll('tbody tr').length < count, before)
  const shown = await rows.count()
  expect(shown).toBeGreaterThan(0)
  expect(await rows.locator('td:nth-child(2)').allTextContents()).toEqual(Array(shown).fill('Respirator fit test'))

  await page.getByText(/^Export these/).click()
  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'CSV', exact: true }).click()])
  expect(download.suggestedFilename()).toBe('credentials-2026-12-01.csv')
  const exported: Record<string, string>[] = parse(readFileSync(await download.path()), { bom: true, columns: true })
  expect(exported).toHaveLength(shown)
  expect(new Set(exported.map(row => row.Credential))).toEqual(new Set(['Respirator fit test']))

  await page.getByRole('button', { name: 'Send reminders' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByRole('button', { name: 'Send reminders' }).click()
  await page.getByText(/message(s are| is) on (its|their) way/).waitFor()
  expect(complaints).toEqual([])
  expect(await axeFindings(page)).toEqual([])

  const queue = new Database(inject('databasePath'), { readonly: true })
  const bodies = queue.prepare('select body from mail where key like ?').pluck().all('reminder-sent:2026-12-01:%') as string[]
  queue.close()
  expect(bodies.length).toBeGreaterThan(0)
  for (const body of bodies) expect(body).toMatch(/Respirator fit test|Prueba de ajuste de respirador/)
  await context.close()
})

test('the address alone brings a filtered view back, sorted as it was', async () => {
  const { page, context } = await openAs('safety')
  await visit(page, '/credentials?state=expired&all=true&sort=-expiresOn')
  expect(new Set(await page.locator('tbody td:nth-child(3)').allInnerTexts())).toEqual(new Set(['expired']))
  expect(await page.locator('th[aria-sort="descending"]').innerText()).toContain('Expires')
  await context.close()
})

test('a hand adds a card with a photo; the safety manager verifies it; a stranger checks it', async () => {
  const hand = await openAs('installer', narrow)
  await visit(hand.page, '/my-cards')
  expect(await sidewaysScroll(hand.page)).toBe(0)
  await hand.page.getByRole('link', { name: 'Add a card' }).click()
  await hand.page.waitForURL(/credentials\/new/)
  await hydrated(hand.page)
  await hand.page.getByRole('button', { name: 'Add the card' }).click()
  await hand.page.getByRole('alert').waitFor()
  const type = hand.page.getByLabel('What card is it?')
  await type.selectOption('aerial-lift')
  await hand.page.getByLabel('Date of issue').fill('2026-11-20')
  await hand.page.getByLabel(/Photo or PDF/).setInputFiles({ name: 'card.pdf', mimeType: 'application/pdf', buffer: onePagePdf() })
  await hand.page.getByText('The file is ready.').waitFor()
  await hand.page.getByRole('button', { name: 'Add the card' }).click()
  await hand.page.waitForURL(/credentials\/[\w-]{36}$/)
  await hydrated(hand.page)
  await hand.page.getByText('not verified').first().waitFor()
  expect(await axeFindings(hand.page)).toEqual([])
  expect(await sidewaysScroll(hand.page)).toBe(0)
  expect(hand.complaints).toEqual([])

  const manager = await openAs('safety')
  await visit(manager.page, new URL(hand.page.url()).pathname)
  await manager.page.locator('canvas').first().waitFor({ timeout: 20_000 })
  await manager.page.getByRole('button', { name: 'Verify' }).click()
  const code = await manager.page.locator('.font-mono').first().innerText()
  expect(manager.complaints).toEqual([])

  const stranger = await openDevice(browser, { size: narrow, language: 'es' })
  await visit(stranger.page, `/VERIFY/${code}`)
  expect(await stranger.page.getByRole('heading', { level: 1 }).innerText()).toBe('Vale hoy')
  expect(await axeFindings(stranger.page)).toEqual([])
  expect(await sidewaysScroll(stranger.page)).toBe(0)
  expect(stranger.complaints).toEqual([])
  for (const device of [hand, manager, stranger]) await device.context.close()
})

/** The smallest PDF with a page that a reader draws. */
function onePagePdf(): Buffer {
  const objects = ['<</Type/Catalog/Pages 2 0 R>>', '<</Type/Pages/Kids[3 0 R]/Count 1>>', '<</Type/Page/Parent 2 0 R/MediaBox[0 0 200 120]>>']
  let text = '%PDF-1.4\n'
  const starts = objects.map((object, index) => {
    const start = text.length
    text += `${index + 1} 0 obj${object}endobj\n`
    return start
  })
  const table = text.length
  text += `xref\n0 4\n0000000000 65535 f \n${starts.map(start => `${String(start).padStart(10, '0')} 00000 n \n`).join('')}trailer<</Size 4/Root 1 0 R>>\nstartxref\n${table}\n%%EOF\n`
  return Buffer.from(text, 'latin1')
}
