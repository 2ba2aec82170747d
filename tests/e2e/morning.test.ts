import { randomUUID } from 'node:crypto'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { axeFindings, desk, hydrated, narrow, openBrowser, openDevice, sidewaysScroll, visit } from '../support/browser'
import { signedIn } from '../support/client'
import { pagesOf } from '../support/read-pdf'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function signInAs(page: Page, origin: string, body: Record<string, string>): Promise<void> {
  const answer = await page.context().request.post(`${origin}/api/session`, { data: body, headers: { origin } })
  expect(answer.status()).toBe(200)
}
/** At the end of the page the bars at the bottom lie over nothing, so axe sees every target whole. */
const fits = async (page: Page) => {
  await page.evaluate(() => window.scrollTo(0, document.body.scrollHeight))
  expect(await axeFindings(page)).toEqual([])
  expect(await sidewaysScroll(page)).toBe(0)
}
const byMail = (who: string) => ({ email: `${who}@cedarhollow.example`, password: 'running-bond' })

it('a foreman runs the morning while three phones sign in, then closes and seals it, and a stranger rechecks it', async () => {
  const foreman = await openDevice(browser)
  const { page, origin } = foreman
  await signInAs(page, origin, byMail('foreman'))
  await visit(page, '/')
  expect(await page.getByRole('heading', { level: 1 }).textContent()).toMatch(/^\d+ of \d+ cleared$|^All \d+ cleared$/)
  await fits(page)
  await page.getByRole('button', { name: /^Start (the|another) briefing$/ }).click()
  await page.waitForURL(/\/briefings\/[\w-]+$/)
  const id = page.url().split('/').at(-1)!
  await page.locator('[data-test=digits]').waitFor()
  await fits(page)
  const before = await page.locator('[data-test=count]').textContent()
  expect(before).toMatch(/^0 of \d+ signed$/)
  const scan = async () => ((await (await page.context().request.get(`${origin}/api/briefings/${id}/presence`)).json()) as { url: string }).url

  // A known phone: scanning the code opens the link; one tap signs.
  const installer = await openDevice(browser)
  await signInAs(installer.page, origin, byMail('installer'))
  await installer.page.goto(await scan())
  await installer.page.getByRole('button', { name: 'I heard it' }).click()
  await installer.page.getByRole('heading', { name: 'You are on the list' }).waitFor()
  expect(installer.page.url()).not.toContain('c=')
  await page.getByText(/^1 of \d+ signed$/).waitFor()

  // A new hire in Spanish, from the poster: digits, then badge and PIN.
  const newHire = await openDevice(browser, { language: 'es' })
  await visit(newHire.page, new URL(await scan()).pathname)
  await fits(newHire.page)
  await newHire.page.getByLabel('Escriba los seis números').fill((await page.locator('[data-test=digits]').textContent())!)
  await newHire.page.getByRole('button', { name: 'Siguiente' }).click()
  await newHire.page.getByLabel('Gafete', { exact: true }).fill('2041')
  await newHire.page.getByLabel('PIN', { exact: true }).fill('739416')
  await fits(newHire.page)
  await newHire.page.getByRole('button', { name: 'La escuché' }).click()
  await newHire.page.getByRole('heading', { name: 'Usted ya está en la lista' }).waitFor()
  await page.getByText(/^2 of \d+ signed$/).waitFor()

  // A visitor, who reloads in between and keeps the admission.
  const guest = await openDevice(browser, { size: narrow })
  await guest.page.goto(await scan())
  await guest.page.getByText('I am a visitor').waitFor()
  await guest.page.reload()
  await hydrated(guest.page)
  await guest.page.getByText('I am a visitor').click()
  await guest.page.getByLabel('Your name').fill('Ada Cole')
  await guest.page.getByLabel('Your company').fill('Redpump')
  await fits(guest.page)
  await guest.page.getByRole('button', { name: 'I heard it' }).click()
  await guest.page.getByRole('heading', { name: 'You are on the list' }).waitFor()
  await page.getByText('Last: Ada Cole, own phone', { exact: false }).waitFor()

  // By hand, and from hand to hand.
  await page.getByRole('button', { name: 'Add by hand' }).click()
  await page.getByRole('dialog').getByRole('checkbox').first().check()
  await page.getByRole('dialog').getByRole('checkbox').nth(1).check()
  await page.getByLabel('Why by hand?').selectOption('deadPhone')
  await fits(page)
  await page.getByRole('button', { name: 'Add 2' }).click()
  await page.getByText(/^5 of \d+ signed$/).waitFor()
  await page.getByRole('button', { name: 'Pass this phone' }).click()
  await page.getByRole('dialog').getByRole('button').first().click()
  await page.getByRole('dialog').getByRole('button', { name: 'I heard it' }).click()
  await page.getByText(/^6 of \d+ signed$/).waitFor()
  await page.getByRole('button', { name: 'Give the phone back' }).click()

  // Close and seal; each asks first.
  await page.locator('main').getByRole('button', { name: 'Close', exact: true }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Close the briefing' }).click()
  await page.getByText('Latecomers can still sign', { exact: false }).waitFor()
  await page.getByRole('button', { name: 'Seal', exact: true }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Seal the sheet' }).click()
  await page.getByRole('heading', { name: 'Sealed. 6 signed.' }).waitFor()
  await fits(page)

  const pdf = await page.context().request.get(`${origin}${await page.getByRole('link', { name: 'Sheet (PDF)' }).getAttribute('href')}`)
  expect((await pagesOf(await pdf.body())).join(' ')).toContain('Ada Cole')

  const stranger = await openDevice(browser, { size: desk })
  await visit(stranger.page, (await page.getByRole('link', { name: 'Check link' }).getAttribute('href'))!)
  expect(await stranger.page.getByRole('heading', { level: 1 }).textContent()).toContain('Intact')
  await fits(stranger.page)
  expect(await stranger.page.content()).not.toContain('Ada Cole')

  for (const device of [foreman, installer, newHire, guest, stranger]) expect(device.complaints).toEqual([])
  for (const device of [foreman, installer, newHire, guest, stranger]) await device.context.close()
})

it('whoever missed a sealed talk reads it, answers, and signs for themselves', async () => {
  const foreman = await signedIn('foreman')
  const { body: { sites } } = await foreman.get<{ sites: { id: string }[] }>('/api/session/sites')
  const { body: { id } } = await foreman.post<{ id: string }>('/api/briefings', { id: randomUUID(), siteId: sites[0]!.id, talk: 'first-blocks', work: ['stack'] })
  await foreman.post(`/api/briefings/${id}/closing`, {})
  await foreman.post(`/api/briefings/${id}/sealing`, {})
  const { page, origin, complaints, context } = await openDevice(browser)
  await signInAs(page, origin, byMail('installer'))
  await visit(page, `/briefings/${id}`)
  expect(await page.getByRole('heading', { level: 1 }).textContent()).toBe('You missed this talk')
  await fits(page)
  await page.getByRole('button', { name: 'Send and sign' }).click()
  await page.getByText('Pick an answer first.').waitFor()
  await page.getByRole('radio').nth(1).check()
  await page.getByRole('button', { name: 'Send and sign' }).click()
  await page.getByRole('heading', { name: 'You are on the list' }).waitFor()
  expect(complaints).toEqual([])
  await context.close()
})

it.each([['safety', desk, '/'], ['safety', desk, '/briefings'], ['foreman', narrow, '/briefings'], ['installer', narrow, '/']] as const)('%s reads %j %s without anything cut off or out of reach', async (who, size, path) => {
  const { page, origin, complaints, context } = await openDevice(browser, { size })
  await signInAs(page, origin, byMail(who))
  await visit(page, path)
  await fits(page)
  expect(await page.getByRole('heading', { level: 1 }).count()).toBe(1)
  expect(complaints).toEqual([])
  await context.close()
})
