import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { axeFindings, desk, hydrated, openBrowser, openDevice, visit } from '../support/browser'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function openAsSafety() {
  const device = await openDevice(browser, { size: desk, language: 'en' })
  const answer = await device.context.request.post(`${device.origin}/api/session`, { data: { email: 'safety@cedarhollow.example', password: 'running-bond' }, headers: { origin: device.origin } })
  expect(answer.status()).toBe(200)
  return device
}

test('the safety manager sees which questions need a look, narrows by language, and the address keeps it', async () => {
  const { page, complaints, context } = await openAsSafety()
  await visit(page, '/item-review')
  const heading = page.getByRole('heading', { level: 1 })
  expect(await heading.textContent()).toMatch(/^\d+ of \d+ questions needs? a look$/)
  expect(await page.locator('tbody tr td:nth-child(2) ul').first().innerText()).toMatch(/Too easy|Too hard|Does not separate|Key may be wrong/)
  const asked = () => page.locator('table').last().locator('tbody tr td:nth-child(3)').allInnerTexts().then(texts => texts.reduce((sum, text) => sum + Number(text), 0))
  const inAll = await asked()
  await page.getByLabel('Taken in').selectOption('es')
  await page.getByRole('button', { name: 'Show' }).click()
  await page.waitForURL(/takenIn=es/)
  await page.getByText('· Spanish').waitFor()
  expect(await asked()).toBeLessThan(inAll)
  await page.getByRole('button', { name: 'Asked' }).click()
  await page.waitForURL(/sort=served/)
  await page.getByText('Export', { exact: false }).first().click()
  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'CSV', exact: true }).click()])
  expect(download.suggestedFilename()).toMatch(/^question-review-[\w-]+-es-2026-12-01\.csv$/)
  expect(complaints).toEqual([])
  await context.close()
})

test('the safety manager takes a question out after seeing what that changes, and puts it back', async () => {
  const { page, complaints, context } = await openAsSafety()
  await visit(page, '/item-review?module=steel')
  await hydrated(page)
  await page.locator('tbody a').first().click()
  await page.waitForURL(/item-review\/steel-/)
  await page.getByText('(right)').first().waitFor()
  await page.getByRole('button', { name: 'See what it changes' }).click()
  await page.getByRole('alert').waitFor()
  await page.getByLabel('Why?').fill('Our drawings say it otherwise')
  await page.getByRole('button', { name: 'See what it changes' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByText('Nobody passes through it. Take it out?').waitFor()
  expect(await axeFindings(page)).toEqual([])
  await dialog.getByRole('button', { name: 'Take it out' }).click()
  await page.getByText('Taken out: Our drawings say it otherwise').waitFor()
  await page.getByLabel('Why?').fill('The drawings were mended')
  await page.getByRole('button', { name: 'Put it back' }).click()
  await page.getByText(/^Put back by/).waitFor()
  expect(await page.getByRole('button', { name: 'See what it changes' }).isVisible()).toBe(true)
  expect(complaints).toEqual([])
  expect(await axeFindings(page)).toEqual([])
  await context.close()
})
