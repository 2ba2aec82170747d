import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, inject, it } from 'vitest'
import { signedIn } from '../support/client'
import { openBrowser } from '../support/browser'

/** What the page behind a poster's QR may cost over the air with nothing kept: `npm run bench` compares it with an empty page. */
const budget = 200 * 1024

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

it('the page that opens from the QR stays within its budget, and fetches no letters that it does not show', async () => {
  const foreman = await signedIn('foreman')
  const site = (await foreman.get<{ sites: { code: string }[] }>('/api/session/sites')).body.sites[0]!.code
  const context = await browser.newContext({ baseURL: inject('origin'), viewport: { width: 360, height: 740 }, serviceWorkers: 'block', locale: 'en-US' })
  const page = await context.newPage()
  const devtools = await context.newCDPSession(page)
  await devtools.send('Network.enable')
  const files = new Map<string, { url: string, bytes: number }>()
  devtools.on('Network.responseReceived', event => files.set(event.requestId, { url: event.response.url, bytes: 0 }))
  devtools.on('Network.loadingFinished', (event) => {
    const file = files.get(event.requestId)
    if (file) file.bytes = event.encodedDataLength
  })
  await page.goto(`/s/${site}`, { waitUntil: 'networkidle' })
  const total = [...files.values()].reduce((sum, file) => sum + file.bytes, 0)
  console.info(`The sign-in page came as ${Math.round(total / 1024)} KB in ${files.size} files`)
  expect(total).toBeGreaterThan(50 * 1024)
  expect(total).toBeLessThan(budget)
  expect([...files.values()].map(file => file.url).filter(url => url.includes('latin-ext'))).toEqual([])
  await context.close()
})
