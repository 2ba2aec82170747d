import { existsSync } from 'node:fs'
import { chromium, type Browser } from 'playwright-core'

/** A slow phone on a bad network: 4 times slower than this machine, 400 kbit/s down, 400 ms of round trip, nothing cached. */
export const slowPhone = { slowerBy: 4, bytesPerSecond: 50_000, roundTripMs: 400 }

export interface PageWeight { transferred: number, readableMs: number }

export async function openBenchBrowser(): Promise<Browser> {
  const executablePath = [process.env.CHROMIUM_PATH, '/usr/bin/chromium'].find(file => file && existsSync(file))
  return chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'] })
}

/** Bytes over the air until the page is quiet, and milliseconds until its text can be read (first contentful paint), on the slow phone. */
export async function weighPage(browser: Browser, origin: string, path: string, signIn?: { email: string, password: string }): Promise<PageWeight> {
  const context = await browser.newContext({ baseURL: origin, viewport: { width: 360, height: 740 }, serviceWorkers: 'block' })
  if (signIn) await context.request.post('/api/session', { data: signIn, headers: { origin } })
  const page = await context.newPage()
  const devtools = await context.newCDPSession(page)
  await devtools.send('Network.enable')
  await devtools.send('Network.emulateNetworkConditions', { offline: false, latency: slowPhone.roundTripMs, downloadThroughput: slowPhone.bytesPerSecond, uploadThroughput: slowPhone.bytesPerSecond })
  await devtools.send('Emulation.setCPUThrottlingRate', { rate: slowPhone.slowerBy })
  let transferred = 0
  devtools.on('Network.loadingFinished', event => (transferred += event.encodedDataLength))
  await page.goto(path, { waitUntil: 'networkidle', timeout: 120_000 })
  const readableMs = await page.evaluate(() => performance.getEntriesByName('first-contentful-paint')[0]?.startTime ?? 0)
  await context.close()
  return { transferred, readableMs }
}
