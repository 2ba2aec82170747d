import { createHash } from 'node:crypto'
import canonicalize from 'canonicalize'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { createClient, signedIn } from '../support/client'
import { pagesOf } from '../support/read-pdf'
import { desk, openBrowser, openDevice, phone, visit } from '../support/browser'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function openAs(who: string) {
  const device = await openDevice(browser, { size: desk })
  const answer = await device.context.request.post(`${device.origin}/api/session`, { data: { email: `${who}@cedarhollow.example`, password: 'running-bond' }, headers: { origin: device.origin } })
  expect(answer.status()).toBe(200)
  return device
}

test('a site packet is previewed, made, read by a visitor without an account, and ended', async () => {
  const { page, context, complaints } = await openAs('safety')
  await visit(page, '/packets')
  if (!await page.getByRole('button', { name: 'Show what it holds' }).isVisible()) await page.getByText('Make a site packet').click()
  await page.getByRole('button', { name: 'Show what it holds' }).click()
  await page.getByRole('heading', { name: /^\d+ people$/ }).waitFor()
  await page.getByRole('button', { name: 'Make it' }).click()
  const link = (await page.locator('p.font-mono').textContent())!.trim()

  const visitor = await openDevice(browser, { size: phone, language: 'es' })
  await visit(visitor.page, new URL(link).pathname)
  await visitor.page.getByRole('heading', { level: 1, name: /^Expediente de la obra: / }).waitFor()
  await visitor.page.getByText('Registro de la empresa, no es una licencia').first().waitFor()
  await visitor.page.getByText('Andre Whitlock').waitFor()

  await page.reload()
  await page.getByText('Looked at once').first().waitFor()
  await page.getByRole('button', { name: 'End this link' }).first().click()
  await page.getByRole('dialog').getByRole('button', { name: 'End this link' }).click()
  await page.getByText('ended by hand').first().waitFor()
  await visitor.page.reload()
  await visitor.page.getByRole('heading', { level: 1, name: 'Este enlace terminó' }).waitFor()
  expect(await visitor.page.getByText('Whitlock').count()).toBe(0)
  expect(complaints).toEqual([])
  for (const device of [context, visitor.context]) await device.close()
})

test('a packet\'s paper says on every page what it is, leaves private things out, and its hash is that of its contents', async () => {
  const safety = await signedIn('safety')
  const sites = (await safety.get<{ items: { id: string, name: string }[] }>('/api/sites')).body.items
  const made = (await safety.post<{ url: string, hash: string, contents: object }>('/api/packets', { siteId: sites[0]!.id, endsOn: new Date(Date.now() + 5 * 86_400_000).toISOString().slice(0, 10), parts: ['duties', 'credentials', 'sheets'], sheets: 30 })).body
  expect(createHash('sha256').update(canonicalize(made.contents)!).digest('hex')).toBe(made.hash)
  const stranger = createClient()
  const token = new URL(made.url).pathname.split('/').pop()!
  const answer = await fetch(`${stranger.origin}/api/packets/by-link/${token}/packet.pdf?language=en`)
  expect(answer.headers.get('content-type')).toBe('application/pdf')
  const pages = await pagesOf(new Uint8Array(await answer.arrayBuffer()))
  expect(pages.length).toBeGreaterThan(1)
  for (const text of pages) expect(text).toContain('Company record, not a licence')
  const everything = JSON.stringify(made.contents) + pages.join(' ')
  expect(everything).toContain('Abel Trujillo Mena')
  for (const left of ['@cedarhollow', '(970)', 'hung load', 'onHold', '2041', 'score', '"language"']) expect(everything).not.toContain(left)
  expect((await stranger.get(`/api/packets/by-link/${'x'.repeat(43)}`)).status).toBe(404)
})

test('a packet\'s link can\'t be made to end in the past or after more than a year, nor for a site out of reach', async () => {
  const foreman = await signedIn('foreman')
  const own = (await foreman.get<{ sites: { id: string }[] }>('/api/session/sites')).body.sites.map(site => site.id)
  const all = (await (await signedIn('safety')).get<{ items: { id: string }[] }>('/api/sites')).body.items
  const body = { siteId: own[0]!, parts: [] }
  expect((await foreman.post('/api/packets', { ...body, endsOn: '2026-01-01' })).body).toMatchObject({ statusCode: 422, data: { fields: { endsOn: expect.any(String) as string } } })
  expect((await foreman.post('/api/packets', { ...body, endsOn: '2030-01-01' })).status).toBe(422)
  expect((await foreman.post('/api/packets', { ...body, siteId: all.find(site => !own.includes(site.id))!.id, endsOn: new Date().toISOString().slice(0, 10) })).status).toBe(404)
})
