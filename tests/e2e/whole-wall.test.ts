import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { modules } from '#shared/domain/curriculum'
import type { WallView } from '#shared/schemas/learning'
import { openBrowser, openDevice, visit } from '../support/browser'
import { signedIn, type Client } from '../support/client'
import { answerEverythingRight } from '../support/quiz-player'
import { startServer, type RunningServer } from '../support/server'
import { readRealTeaching } from '../support/teaching'

/** The key is read by the test alone, from the server's own files; the learner's browser never has it. */
const teaching = readRealTeaching()
const words = {
  en: { start: 'Start the quiz', submit: 'Send my answers', passed: 'You passed the quiz', ask: 'Ask for the hands-on', asked: 'Hands-on asked for' },
  es: { start: 'Empezar el examen', submit: 'Enviar mis respuestas', passed: 'Aprobó el examen', ask: 'Pedir la práctica', asked: 'Práctica pedida' },
}

let browser: Browser
let server: RunningServer
let safety: Client
beforeAll(async () => {
  [browser, server] = await Promise.all([openBrowser(), startServer({ env: { NUXT_DEMO: 'true', NUXT_CLOCK: '2026-12-01T13:30:00Z' } })])
  safety = await signedIn('safety', server.origin)
})
afterAll(() => Promise.all([browser.close(), server.stop()]))

/** Somebody who has learned nothing yet, with a phone of their own. */
async function joinsToday(language: 'en' | 'es') {
  const office = await signedIn('office', server.origin)
  const person = (await office.post<{ id: string }>('/api/people', { name: language === 'es' ? 'Lucía Prado' : 'Jonah Reed', badge: `W${language}`, language })).body
  const { url } = (await office.post<{ url: string }>(`/api/people/${person.id}/join-link`)).body
  const device = await openDevice(browser, { language, origin: server.origin })
  await visit(device.page, new URL(url).pathname)
  for (const name of ['pin', 'again']) await device.page.locator(`input[name=${name}]`).fill('583917')
  await device.page.locator('form button[type=submit]').click()
  await device.page.waitForURL('**/learn')
  return { ...device, personId: person.id }
}

const statesOf = async (page: Page) => new Map(((await (await page.context().request.get('/api/modules')).json()) as WallView).items.map(item => [item.slug, item.state]))

/** Every block is as running bond asks: laid ones laid, those on laid ground open, all others waiting. */
function expectedStates(laid: ReadonlySet<string>) {
  return new Map(modules.map(module => [module.slug, laid.has(module.slug) ? 'laid' : module.restsOn.every(below => laid.has(below)) ? 'open' : 'waiting']))
}

async function readLessons(page: Page, slug: string, language: 'en' | 'es') {
  const taught = teaching.get(slug)!
  await visit(page, `/learn/${slug}/${taught.lessons[0]!.slug}`)
  for (const lesson of taught.lessons) {
    await page.waitForURL(`**/learn/${slug}/${lesson.slug}`)
    await page.getByRole('heading', { level: 1, name: lesson.title[language], exact: true }).waitFor()
    await page.locator('article svg[role=img]').first().waitFor()
    await page.locator('main').getByRole('button').filter({ hasText: language === 'es' ? /^(Siguiente: |Listo: )/ : /^(Next: |Done: )/ }).click()
  }
  await page.waitForURL(`**/learn/${slug}/quiz`)
}

async function passQuiz(page: Page, slug: string, language: 'en' | 'es') {
  await page.getByRole('button', { name: words[language].start }).click()
  await page.waitForURL(/attempt=/)
  await page.locator('h1.quiz-stem').waitFor()
  await answerEverythingRight(page, teaching.get(slug)!.bank.items, language)
  await page.getByRole('button', { name: words[language].submit }).click()
  await page.getByRole('heading', { level: 1, name: words[language].passed }).waitFor()
  await page.getByRole('button', { name: words[language].ask }).click()
  await page.getByText(words[language].asked).first().waitFor()
}

describe.each(['en', 'es'] as const)('a learner in %s', (language) => {
  it('lays all 16 blocks from the bottom to the top; no block opens early, and each ends in a card', { timeout: 600_000 }, async () => {
    const { page, context, personId, complaints } = await joinsToday(language)
    const laid = new Set<string>()
    for (const { slug, title } of modules) {
      expect(await statesOf(page)).toEqual(expectedStates(laid))
      for (const [waiting] of [...expectedStates(laid)].filter(([, state]) => state === 'waiting').slice(0, 2)) {
        const early = await context.request.post(`/api/modules/${waiting}/attempts`, { headers: { origin: server.origin } })
        expect([waiting, early.status(), ((await early.json()) as { data: { code: string } }).data.code]).toEqual([waiting, 409, 'notOpen'])
      }
      await readLessons(page, slug, language)
      await passQuiz(page, slug, language)
      expect((await statesOf(page)).get(slug)).toBe('passed')
      const steps = teaching.get(slug)!.text.en.checklist.map(({ id }) => ({ id, ok: true }))
      const signed = await safety.post<{ credentialId?: string }>('/api/sign-offs', { personId, module: slug, steps, mark: { kind: 'typed', text: 'Safety' } })
      expect([slug, signed.status, signed.body.credentialId !== undefined]).toEqual([slug, 201, true])
      laid.add(slug)
      await visit(page, `/learn/${slug}`)
      expect(await page.locator('h1').innerText()).toContain(title[language])
    }
    expect([...(await statesOf(page)).values()].every(state => state === 'laid')).toBe(true)
    await visit(page, '/my-cards')
    for (const { title } of modules) expect(await page.locator('main').getByText(title[language], { exact: true }).count()).toBeGreaterThan(0)
    expect(complaints.filter(line => !line.includes('409'))).toEqual([])
    await context.close()
  })
})
