import { existsSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core'
import { inject } from 'vitest'

const require = createRequire(import.meta.url)
const executablePath = [process.env.CHROMIUM_PATH, '/usr/bin/chromium', '/usr/bin/google-chrome'].find(path => path && existsSync(path))
const flags = ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync']
const axeSource = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8')

/** The browser that is on this machine, without a window. */
export const openBrowser = (): Promise<Browser> => chromium.launch({ executablePath, headless: true, args: flags })

export const phone = { width: 360, height: 740 }
export const narrow = { width: 320, height: 640 }
export const desk = { width: 1440, height: 900 }

/** One person's browser: a context of its own, in a language and size. Everything it complains about lands in `complaints`. */
export async function openDevice(browser: Browser, options: { size?: { width: number, height: number }, language?: 'en' | 'es', origin?: string } = {}): Promise<{ context: BrowserContext, page: Page, complaints: string[], origin: string }> {
  const { size = phone, language = 'en', origin = inject('origin') } = options
  const context = await browser.newContext({ viewport: size, baseURL: origin, locale: language === 'es' ? 'es-US' : 'en-US', hasTouch: size.width < 1000, isMobile: size.width < 1000 })
  const page = await context.newPage()
  const complaints: string[] = []
  page.on('console', message => message.type() === 'error' && complaints.push(message.text()))
  page.on('pageerror', error => complaints.push(String(error)))
  return { context, page, complaints, origin }
}

/** Opens a path and waits until Vue has taken the page over. */
export async function visit(page: Page, path: string): Promise<void> {
  await page.goto(path)
  await hydrated(page)
}

/** Waits until the page answers to clicks. */
export async function hydrated(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const app = (globalThis as unknown as { useNuxtApp?: () => { isHydrating: boolean } }).useNuxtApp
    return app ? app().isHydrating === false : (document.querySelector('#__nuxt') as unknown as { __vue_app__?: unknown })?.__vue_app__ !== undefined
  })
}

/**
 * What axe finds against WCAG 2.2 AA, a line each; empty when nothing. The page is judged at its full height: a bar
 * that sticks to the window covers what scrolls under it, and what it covers could be scrolled free.
 */
export async function axeFindings(page: Page): Promise<string[]> {
  const before = page.viewportSize()
  if (before) await page.setViewportSize({ ...before, height: Math.max(before.height, await page.evaluate(() => document.documentElement.scrollHeight)) })
  await page.evaluate(axeSource)
  const found = await page.evaluate(async () => {
    interface Axe { run: (target: Document, options: unknown) => Promise<{ violations: { id: string, help: string, nodes: { target: string[] }[] }[] }> }
    const axe = (globalThis as unknown as { axe: Axe }).axe
    const result = await axe.run(document, { runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'] } })
    return result.violations.map(found => `${found.id}: ${found.help} (${found.nodes.map(node => node.target.join(' ')).join(', ')})`)
  })
  if (before) await page.setViewportSize(before)
  return found
}

/** How many pixels the page is wider than its window; 0 when it scrolls nowhere sideways. */
export const sidewaysScroll = (page: Page): Promise<number> => page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
