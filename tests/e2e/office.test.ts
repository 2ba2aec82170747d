import type { Browser } from 'playwright-core'
import { signedIn } from '../support/client'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { desk, openBrowser, openDevice, phone, visit } from '../support/browser'

let browser: Browser
beforeAll(async () => {
  browser = await openBrowser()
})
afterAll(() => browser.close())

async function openAs(who: string, size = desk) {
  const device = await openDevice(browser, { size })
  const answer = await device.context.request.post(`${device.origin}/api/session`, { data: { email: `${who}@cedarhollow.example`, password: 'running-bond' }, headers: { origin: device.origin } })
  expect(answer.status()).toBe(200)
  return device
}

test('the office adds a person, whose phone opens the join link, sets a PIN and lands on the wall', async () => {
  const office = await openAs('office')
  await visit(office.page, '/people/new')
  await office.page.getByRole('button', { name: 'Add a person' }).click()
  await office.page.getByText('Please fix this first').waitFor()
  await office.page.getByLabel('Name', { exact: true }).fill('Rosalía Medrano Paz')
  await office.page.getByLabel('Badge', { exact: true }).fill('8831')
  await office.page.getByLabel('Language', { exact: true }).selectOption('es')
  await office.page.getByRole('button', { name: 'Add a person' }).click()
  await office.page.getByRole('heading', { level: 1, name: 'Rosalía Medrano Paz' }).waitFor()
  await office.page.getByRole('button', { name: 'Make a join link' }).click()
  const link = (await office.page.locator('text=/\\/join\\//').textContent())!.trim()
  expect(await office.page.getByRole('img', { name: /QR code/ }).isVisible()).toBe(true)

  const hire = await openDevice(browser, { size: phone, language: 'es' })
  await visit(hire.page, new URL(link).pathname)
  await hire.page.getByText('8831').waitFor()
  const [pin, again] = [hire.page.locator('input[name=pin]'), hire.page.locator('input[name=again]')]
  await pin.fill('123456')
  await again.fill('123456')
  await hire.page.getByRole('button', { name: 'Empezar' }).click()
  await hire.page.getByRole('alert').waitFor()
  expect(new URL(hire.page.url()).pathname).toContain('/join/')
  await pin.fill('582039')
  await again.fill('582039')
  await hire.page.getByRole('button', { name: 'Empezar' }).click()
  await hire.page.waitForURL('**/learn')
  await hire.page.getByRole('heading', { level: 1, name: 'Su muro' }).waitFor()

  const second = await openDevice(browser, { size: phone })
  await visit(second.page, new URL(link).pathname)
  expect(await second.page.locator('input[name=pin]').count()).toBe(0)
  expect(office.complaints).toEqual([])
  for (const device of [office, hire, second]) await device.context.close()
})

test('the safety manager sees whom a rule would stop before it is saved, and takes it away again', async () => {
  const { page, context, complaints } = await openAs('safety')
  await visit(page, '/requirements')
  const rules = async () => Number(/^\d+/.exec((await page.getByRole('heading', { level: 1 }).textContent())!)![0])
  const before = await rules()
  await page.getByRole('button', { name: 'Add a rule' }).click()
  await page.getByLabel('Duty', { exact: true }).selectOption('stacker')
  await page.getByLabel('Asks for', { exact: true }).selectOption('scaffold-erector')
  await page.getByRole('button', { name: 'See whom it stops' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByRole('heading', { name: /^It stops \d+ people/ }).waitFor()
  expect(await dialog.getByText('Andre Whitlock').isVisible()).toBe(true)
  expect(await rules()).toBe(before)
  await dialog.getByRole('button', { name: 'Save it' }).click()
  await page.getByRole('heading', { level: 1, name: `${before + 1} rules` }).waitFor()
  const line = page.getByRole('listitem').filter({ hasText: 'Stacker asks for Scaffold erector' })
  await line.getByRole('button', { name: 'Remove' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Remove' }).click()
  await page.getByRole('heading', { level: 1, name: `${before} rules` }).waitFor()
  expect(complaints).toEqual([])
  await context.close()
})

test('a rule that would stop everybody asks twice, and is not saved by one tap', async () => {
  const { page, context, complaints } = await openAs('safety')
  await (await signedIn('safety')).post('/api/credential-types', { code: 'crane-signals', name: { en: 'Crane signals', es: 'Señas de grúa' }, validity: { kind: 'never' }, basis: 'company', source: 'Company rule' })
  await visit(page, '/requirements')
  const heading = page.getByRole('heading', { level: 1 })
  const before = await heading.textContent()
  await page.getByRole('button', { name: 'Add a rule' }).click()
  await page.getByLabel('Asks for', { exact: true }).selectOption('crane-signals')
  await page.getByRole('button', { name: 'See whom it stops' }).click()
  const dialog = page.getByRole('dialog')
  await dialog.getByRole('heading', { name: /^It stops \d+ people/ }).waitFor()
  await dialog.getByRole('button', { name: 'Save it' }).click()
  await dialog.getByText(/^Nobody would be cleared any more for: .*Stacker/).waitFor()
  expect(await heading.textContent()).toBe(before)
  await page.keyboard.press('Escape')
  await dialog.waitFor({ state: 'hidden' })
  await page.reload()
  expect(await heading.textContent()).toBe(before)
  expect(complaints).toEqual([])
  await context.close()
})

test('the foreman sees what each hand may do today', async () => {
  const { page, context, complaints } = await openAs('foreman', phone)
  await visit(page, '/crew')
  await page.getByRole('button', { name: /Andre Whitlock/ }).click()
  await page.getByText('Stacker').first().waitFor()
  expect(complaints).toEqual([])
  await context.close()
})
