import { execFileSync, spawn } from 'node:child_process'
import { randomUUID } from 'node:crypto'
import { existsSync, mkdtempSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import { chromium } from 'playwright-core'
import { buildWhenStale } from '../../scripts/steps.mjs'
import { createClient, signedIn } from '../support/client'
import { freePort, startServer } from '../support/server'
import { measure, type Measured } from './load'
import { openBenchBrowser, slowPhone, weighPage } from './pages'

/*
 * Figures as ratios to an empty app of the same framework, both measured in one run on this machine:
 *   npm run bench
 */

const root = resolve(import.meta.dirname, '../..')
const bareFolder = join(root, 'tests/bench/bare')

async function startBare() {
  if (!existsSync(join(bareFolder, '.output/server/index.mjs'))) {
    execFileSync(process.execPath, [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'build', bareFolder, '--logLevel', 'silent'], { cwd: root, stdio: ['ignore', 'ignore', 'inherit'] })
  }
  const port = await freePort()
  const origin = `http://127.0.0.1:${port}`
  const child = spawn(process.execPath, [join(bareFolder, '.output/server/index.mjs')], { env: { PATH: process.env.PATH, HOST: '127.0.0.1', PORT: String(port), BARE_DATABASE: join(mkdtempSync(join(tmpdir(), 'bare-')), 'bare.sqlite') }, stdio: 'ignore' })
  for (let tries = 0; tries < 100; tries++) {
    if (await fetch(origin).catch(() => null)) break
    await new Promise(done => setTimeout(done, 100))
  }
  return { origin, stop: () => child.kill() }
}

/** Bytes of JavaScript that a first visit loads, as brotli sends them. */
async function scriptBytes(origin: string, path: string): Promise<number> {
  const executablePath = [process.env.CHROMIUM_PATH, '/usr/bin/chromium'].find(file => file && existsSync(file))
  const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'] })
  const page = await browser.newPage()
  const scripts = new Set<string>()
  page.on('response', answer => answer.request().resourceType() === 'script' && scripts.add(answer.url()))
  await page.goto(origin + path, { waitUntil: 'networkidle' })
  await browser.close()
  let bytes = 0
  for (const url of scripts) bytes += Number((await fetch(url, { method: 'HEAD', headers: { 'accept-encoding': 'br' } })).headers.get('content-length') ?? 0)
  return bytes
}

const line = (name: string, measured: Measured) => console.log(`${name.padEnd(44)} ${measured.perSecond.toFixed(0).padStart(7)} /s   p50 ${measured.p50.toFixed(1)} ms   p99 ${measured.p99.toFixed(1)} ms   ${JSON.stringify(measured.statuses)}`)

async function benchSignIns(origin: string, bareOrigin: string, count: number): Promise<string> {
  const foreman = await signedIn('foreman', origin)
  const sites = (await foreman.get<{ sites: { id: string, code: string }[] }>('/api/session/sites')).body.sites
  const talk = (await foreman.get<{ items: { slug: string }[] }>('/api/talks')).body.items[0]!.slug
  const briefing = (await foreman.post<{ id: string }>('/api/briefings', { siteId: sites[0]!.id, talk, work: ['stack'] })).body
  const headers = { origin, 'content-type': 'application/json' }
  const { code } = (await foreman.get<{ code: string }>(`/api/briefings/${briefing.id}/presence`)).body
  const path = `/api/briefings/${briefing.id}/sign-ins`
  const visitors = []
  for (let number = 0; number < count; number++) {
    const phone = createClient(origin)
    const { body } = await phone.post<{ admission: string }>(`/api/briefings/${briefing.id}/admissions`, { code })
    const cookie = [...phone.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
    visitors.push({ method: 'POST', path, headers: { ...headers, cookie }, body: JSON.stringify({ key: randomUUID(), admission: body.admission, method: 'ownPhone', mark: { kind: 'tap' }, visitor: { name: `Visitor ${number}`, company: 'Bench' }, language: 'en' }) })
  }
  const bareRequests = visitors.map(({ body }) => ({ method: 'POST', path: '/api/insert', headers: { 'content-type': 'application/json' }, body }))
  await measure(bareOrigin, bareRequests.slice(0, 100))
  const bare = await measure(bareOrigin, bareRequests)
  const product = await measure(origin, visitors)
  line('bare route, one durable INSERT', bare)
  line('POST …/sign-ins, own phones with admissions', product)
  console.log(`sign-ins run at ${(product.perSecond / bare.perSecond).toFixed(3)} of the bare route; p50 ${(product.p50 / bare.p50).toFixed(1)} times, p99 ${(product.p99 / bare.p99).toFixed(1)} times\n`)
  return `/s/${sites[0]!.code}`
}

/** What a phone loads and how long until it can be read, against an empty page of the same framework. */
async function benchPages(origin: string, bareOrigin: string, signInPage: string) {
  const browser = await openBenchBrowser()
  const empty = await weighPage(browser, bareOrigin, '/')
  console.log(`\nSlow phone: processor ${slowPhone.slowerBy} times slower, ${slowPhone.bytesPerSecond * 8 / 1000} kbit/s, ${slowPhone.roundTripMs} ms round trip, empty cache`)
  console.log(`an empty page${' '.repeat(31)} ${(empty.transferred / 1024).toFixed(0).padStart(5)} KB  ${(empty.readableMs / 1000).toFixed(1)} s`)
  const installer = { email: 'installer@cedarhollow.example', password: 'running-bond' }
  for (const [path, who] of [['/learn/stacking/level-and-plumb', installer], ['/learn/pour-rate/the-strictest-limit', installer], ['/sign-in', undefined], [signInPage, undefined]] as const) {
    const own = await weighPage(browser, origin, path, who)
    console.log(`${path.padEnd(44)} ${(own.transferred / 1024).toFixed(0).padStart(5)} KB  ${(own.readableMs / 1000).toFixed(1)} s   ${(own.transferred / empty.transferred).toFixed(2)} times the bytes, ${(own.readableMs / empty.readableMs).toFixed(2)} times the time`)
  }
  await browser.close()
}

buildWhenStale()
const bare = await startBare()
const product = await startServer({ env: { NUXT_DEMO: 'true' } })
try {
  const signInPage = await benchSignIns(product.origin, bare.origin, Number(process.env.BENCH_COUNT ?? 1000))
  await benchPages(product.origin, bare.origin, signInPage)
  const empty = await scriptBytes(bare.origin, '/')
  for (const path of ['/sign-in', signInPage]) {
    const own = await scriptBytes(product.origin, path)
    console.log(`JavaScript of ${path}: ${(own / 1024).toFixed(1)} KB, an empty page ${(empty / 1024).toFixed(1)} KB: ${(own / empty).toFixed(2)} times`)
  }
}
finally {
  bare.stop()
  await product.stop()
}
