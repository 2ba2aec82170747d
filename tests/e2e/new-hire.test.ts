import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { axeFindings, hydrated, narrow, openBrowser, openDevice, phone, sidewaysScroll, visit } from '../support/browser'
import { answerEverythingRight } from '../support/quiz-player'
import { readRealTeaching } from '../support/teaching'

const teaching = readRealTeaching()
const words = {
  es: { 'signIn': 'Entrar', 'wall': 'Su muro', 'next': /^Siguiente: /, 'toQuiz': 'Listo: ir al examen', 'start': 'Empezar el examen', 'submit': 'Enviar mis respuestas', 'passed': 'Aprobó el examen', 'ask': 'Pedir la práctica', 'asked': 'Práctica pedida', 'laid': 'colocado', 'stacking': 'Apilar bloques', 'running-bond': 'Cuatrapeado' },
  en: { 'signIn': 'Sign in', 'wall': 'Your wall', 'next': /^Next: /, 'toQuiz': 'Done: go to the quiz', 'start': 'Start the quiz', 'submit': 'Send my answers', 'passed': 'You passed the quiz', 'ask': 'Ask for the hands-on', 'asked': 'Hands-on asked for', 'laid': 'laid', 'stacking': 'Stacking', 'running-bond': 'Running bond' },
}

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function newHire(language: 'en' | 'es') {
  const device = await openDevice(browser, { language })
  await visit(device.page, '/sign-in')
  await device.page.locator('input[name=badge]').fill('2041')
  await device.page.locator('input[name=pin]').fill('739416')
  await device.page.locator('form button[type=submit]').click()
  await device.page.waitForURL(url => url.pathname !== '/sign-in')
  const answer = await device.context.request.patch('/api/session', { data: { language }, headers: { origin: device.origin } })
  expect(answer.status()).toBe(200)
  return device
}

async function foreman() {
  const device = await openDevice(browser, { language: 'en' })
  const answer = await device.context.request.post('/api/session', { data: { email: 'foreman@cedarhollow.example', password: 'running-bond' }, headers: { origin: device.origin } })
  expect(answer.status()).toBe(200)
  return device
}

/** Every state of a screen is held to the same: nothing for axe to find, no sideways scroll. */
async function expectSound(page: Page) {
  expect(await axeFindings(page)).toEqual([])
  await page.setViewportSize(narrow)
  expect(await sidewaysScroll(page)).toBe(0)
  await page.setViewportSize(phone)
}

/** In mid-quiz the other language asks the same questions, and every answer stays. */
async function switchesLanguageInTheQuiz(page: Page, language: 'en' | 'es') {
  const other = language === 'es' ? 'en' : 'es'
  const stems = await page.locator('main ol > li').allInnerTexts()
  await page.locator(`button[lang=${other}]`).click()
  await page.getByRole('button', { name: words[other].submit }).waitFor()
  const switched = await page.locator('main ol > li').allInnerTexts()
  expect(switched.filter((stem, index) => stem === stems[index])).toEqual([])
  expect(switched).toHaveLength(stems.length)
  expect(await page.getByText(other === 'es' ? 'Sin responder' : 'Not answered').count()).toBe(0)
  await page.locator(`button[lang=${language}]`).click()
  await page.getByRole('button', { name: words[language].submit }).waitFor()
}

describe.each([['stacking', 'es'], ['running-bond', 'en']] as const)('a new hire lays the block "%s" in %s', (slug, language) => {
  it('from the wall over lessons, quiz and hands-on to a card that a stranger can check', async () => {
    const say = words[language]
    const taught = teaching.get(slug)!
    const { page, complaints } = await newHire(language)

    await visit(page, '/learn')
    expect(await page.locator('h1').innerText()).toBe(say.wall)
    expect(await page.locator('html').getAttribute('lang')).toMatch(new RegExp(`^${language}`))
    expect(await page.locator('ol > li:not([aria-hidden])').count()).toBe(16)
    await expectSound(page)

    await page.locator(`ol a[href="/learn/${slug}"]`).click()
    await page.waitForURL(`**/learn/${slug}`)
    await expectSound(page)
    await page.locator(`a[href="/learn/${slug}/${taught.lessons[0]!.slug}"]`).first().click()
    for (const [index, lesson] of taught.lessons.entries()) {
      await page.waitForURL(`**/learn/${slug}/${lesson.slug}`)
      await page.getByRole('heading', { level: 1, name: lesson.title[language] }).waitFor()
      await page.locator('article svg[role=img]').first().waitFor()
      expect(await page.locator('.lesson-caution').count()).toBeGreaterThan(0)
      if (index === 0) await expectSound(page)
      await page.getByRole('button', { name: index + 1 === taught.lessons.length ? say.toQuiz : say.next }).click()
    }
    await page.waitForURL(`**/learn/${slug}/quiz`)
    await page.getByRole('button', { name: say.start }).click()
    await page.waitForURL(/attempt=/)
    await page.locator('h1.quiz-stem').waitFor()
    await expectSound(page)
    await answerEverythingRight(page, taught.bank.items, language)
    await page.reload()
    await hydrated(page)
    await page.getByRole('button', { name: say.submit }).waitFor()
    await expectSound(page)
    await switchesLanguageInTheQuiz(page, language)
    await page.getByRole('button', { name: say.submit }).click()
    await page.getByRole('heading', { level: 1, name: say.passed }).waitFor()
    await expectSound(page)
    await page.getByRole('button', { name: say.ask }).click()
    await page.getByText(say.asked).first().waitFor()

    const lead = await foreman()
    await visit(lead.page, '/sign-offs')
    await expectSound(lead.page)
    await lead.page.getByRole('link').filter({ hasText: `Yesenia Cruz: ${words.en[slug]}` }).click()
    await lead.page.waitForURL('**/sign-offs/*')
    await lead.page.getByRole('button', { name: 'Sign off' }).click()
    await lead.page.getByText('Step 1 is not answered').first().waitFor()
    for (const label of await lead.page.locator('label').filter({ hasText: 'Step done' }).all()) await label.click()
    await lead.page.locator('label').filter({ hasText: 'I watched every step myself' }).click()
    await expectSound(lead.page)
    await lead.page.getByRole('button', { name: 'Sign off' }).click()
    await lead.page.getByText('The card is issued.').waitFor()

    await visit(page, `/learn/${slug}`)
    expect(await page.locator('h1').innerText()).toContain(say.laid)
    const checked = (await page.locator('a[href^="/verify/"]').getAttribute('href'))!
    await visit(page, '/my-cards')
    await page.locator('main').getByText(say[slug]).first().waitFor()
    const stranger = await openDevice(browser)
    await visit(stranger.page, checked)
    await stranger.page.getByRole('heading', { level: 1, name: 'Valid today' }).waitFor()
    await stranger.page.getByText(/^Y\.?\s?C\.?$/).waitFor()
    await expectSound(stranger.page)
    expect([...complaints, ...lead.complaints, ...stranger.complaints]).toEqual([])
    await Promise.all([page.context().close(), lead.context.close(), stranger.context.close()])
  })
})
