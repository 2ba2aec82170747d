import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hydrated, openBrowser, openDevice, visit } from '../support/browser'
import { signedIn } from '../support/client'
import { readRealBanks } from '../support/teaching'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function signIn(page: Page, context: BrowserContext, origin: string, who: { badge: string, pin: string } | { email: string, password: string }) {
  expect((await context.request.post('/api/session', { data: who, headers: { origin } })).status()).toBe(200)
  await visit(page, '/learn')
  await page.evaluate(() => navigator.serviceWorker.ready.then(() => undefined))
}
const installer = { email: 'installer@cedarhollow.example', password: 'running-bond' }
const photoBytes = 1_000_000

describe('a module kept on the phone', () => {
  it('opens without signal in both languages, lighter than a photo, and its reading is recorded when the signal is back', async () => {
    const { page, context, origin } = await openDevice(browser)
    await signIn(page, context, origin, installer)
    await visit(page, '/learn/steel')
    await page.getByRole('button', { name: 'Keep on this phone' }).click()
    await page.getByText(/Kept on this phone \(\d+ KB\)/).waitFor({ timeout: 60_000 })
    const size = Number(/\((\d+) KB\)/.exec(await page.getByText(/Kept on this phone \(/).innerText())?.[1]) * 1024
    console.info(`A kept module came as ${Math.round(size / 1024)} KB`)
    expect(size).toBeGreaterThan(10_000)
    expect(size).toBeLessThan(photoBytes)
    const keptText = await page.evaluate(async () => {
      const texts = []
      for (const name of await caches.keys()) {
        const cache = await caches.open(name)
        for (const request of await cache.keys()) texts.push(await (await cache.match(request))!.text())
      }
      return texts.join('\n')
    })
    for (const item of readRealBanks().find(bank => bank.module === 'steel')!.items) {
      expect(keptText).not.toContain(item.feedback.en)
      expect(keptText).not.toContain(item.stem.es)
    }

    await context.setOffline(true)
    await visit(page, '/learn/steel')
    await page.getByRole('link', { name: /caps and inspection|Caps/i }).first().click()
    await page.waitForURL('**/learn/steel/caps-and-inspection')
    await page.locator('article svg[role=img]').first().waitFor()
    await page.getByRole('button', { name: 'Español' }).click()
    await page.getByRole('heading', { name: 'Por qué lastima' }).waitFor()
    await page.reload()
    await hydrated(page)
    expect(await page.locator('article svg[role=img]').count()).toBeGreaterThan(0)
    await page.locator('article').evaluate(() => window.scrollTo(0, document.body.scrollHeight))
    await page.getByText(/Sin señal\.|No signal\./).first().waitFor()
    await page.getByText(/Guardado en este teléfono: 1|Kept on this phone: 1/).waitFor()

    await page.reload()
    await hydrated(page)
    await page.getByText(/Guardado en este teléfono: [12]|Kept on this phone: [12]/).waitFor()
    await context.setOffline(false)
    await page.evaluate(() => window.dispatchEvent(new Event('online')))
    await page.waitForFunction(() => !/(Guardado en este teléfono|Kept on this phone): /.test(document.body.innerText))
    const module = (await (await context.request.get('/api/modules/steel?language=en')).json()) as { lessons: { slug: string, read: boolean }[] }
    expect(module.lessons.find(lesson => lesson.slug === 'caps-and-inspection')?.read).toBe(true)
    await context.request.patch('/api/session', { data: { language: 'en' }, headers: { origin } })
    await context.close()
  })

  it('is gone from the browser once its reader signs out', async () => {
    const { page, context, origin } = await openDevice(browser)
    await signIn(page, context, origin, installer)
    await visit(page, '/learn/openings')
    await page.getByRole('button', { name: 'Keep on this phone' }).click()
    await page.getByText(/Kept on this phone \(\d+ KB\)/).waitFor({ timeout: 60_000 })
    await visit(page, '/more')
    await page.getByRole('button', { name: 'Sign out' }).click()
    await page.waitForURL('**/sign-in')
    expect(await page.evaluate(async () => (await caches.keys()).filter(name => ['pages', 'answers', 'kept'].includes(name)))).toEqual([])
    await context.close()
  })

  it('never sends what one person read under another person\'s session', async () => {
    const { page, context, origin } = await openDevice(browser)
    await signIn(page, context, origin, installer)
    await visit(page, '/learn/openings/set-the-buck')
    await context.setOffline(true)
    await page.evaluate(() => window.scrollTo(0, document.body.scrollHeight))
    await page.getByText(/Kept on this phone: 1/).waitFor()
    await context.setOffline(false)
    await context.clearCookies()
    const foreman = await signedIn('foreman')
    const before = (await foreman.get<{ lessons: { slug: string, read: boolean }[] }>('/api/modules/openings')).body.lessons.map(lesson => lesson.read)
    await signIn(page, context, origin, { email: 'foreman@cedarhollow.example', password: 'running-bond' })
    await page.evaluate(() => window.dispatchEvent(new Event('online')))
    await page.waitForTimeout(500)
    expect((await foreman.get<{ lessons: { slug: string, read: boolean }[] }>('/api/modules/openings')).body.lessons.map(lesson => lesson.read)).toEqual(before)
    await context.clearCookies()
    await signIn(page, context, origin, installer)
    await page.evaluate(() => window.dispatchEvent(new Event('online')))
    await page.waitForFunction(() => !/Kept on this phone: /.test(document.body.innerText))
    const own = await signedIn('installer')
    expect((await own.get<{ lessons: { slug: string, read: boolean }[] }>('/api/modules/openings')).body.lessons.find(lesson => lesson.slug === 'set-the-buck')?.read).toBe(true)
    await context.close()
  })
})
