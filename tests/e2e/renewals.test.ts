import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { signedIn } from '../support/client'
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

test('people whose cards end are booked into one session, see it on their phone, and are renewed in one action after it', async () => {
  const safety = await signedIn('safety')
  const { page, context, complaints } = await openAs('safety')
  await visit(page, '/renewals?weeks=26')
  await page.getByRole('heading', { level: 1, name: /people have cards to renew within 26 weeks/ }).waitFor()
  const group = page.locator('li').filter({ hasText: 'Heat illness prevention' }).filter({ hasText: 'Book a session' }).first()
  const ended = Number(/(\d+) (?:person|people)/.exec((await group.textContent())!)![1])
  await group.getByText('Book a session').click()
  const today = (await safety.get<{ today: string }>('/api/company')).body.today
  await group.getByLabel('Place').fill('Yard trailer')
  await group.getByLabel('Day').fill(today)
  await group.getByLabel('Start').fill('23:30')
  await group.getByRole('button', { name: 'Book and invite them' }).click()
  await page.getByRole('heading', { level: 1, name: /^Heat illness prevention, / }).waitFor()

  const round = page.url().split('/').pop()!
  const people = (await safety.get<{ people: { personId: string, name: string }[] }>(`/api/renewals/${round}`)).body.people
  expect(people).toHaveLength(ended)
  const boxes = page.locator('li').filter({ has: page.getByRole('checkbox') })
  for (const person of people.slice(1)) await boxes.filter({ hasText: person.name }).getByRole('checkbox').check()
  await page.getByRole('button', { name: 'Save who was there' }).click()
  await page.getByRole('button', { name: new RegExp(`^Renew (1 card|${ended - 1} cards)$`) }).click()
  await page.getByRole('link', { name: 'New card' }).first().waitFor()
  expect(await page.getByRole('link', { name: 'New card' }).count()).toBe(ended - 1)
  await boxes.filter({ hasText: people[0]!.name }).getByText('was not there').waitFor()

  await page.getByRole('link', { name: 'New card' }).first().click()
  await page.getByText('verified').first().waitFor()
  const left = (await safety.get<{ items: { type: string, people: { personId: string }[] }[] }>('/api/renewals/suggestions?weeks=26')).body.items.find(item => item.type === 'heat-illness')
  expect(left?.people.map(person => person.personId)).toEqual([people[0]!.personId])
  expect(complaints).toEqual([])
  await context.close()
})

test('an installer with a seat finds the session on their cards', async () => {
  const safety = await signedIn('safety')
  const installer = (await (await signedIn('installer')).get<{ person: { id: string } }>('/api/session')).body.person.id
  const site = (await safety.get<{ items: { id: string }[] }>('/api/sites')).body.items[0]!
  const date = new Date(Date.now() + 20 * 86_400_000).toISOString().slice(0, 10)
  await safety.post('/api/renewals', { type: 'first-aid-cpr', siteId: site.id, place: 'Fire hall', trainer: 'Iris Lang', date, time: '07:00', minutes: 240, seats: 8, personIds: [installer] })
  const { page, context, complaints } = await openAs('installer', phone)
  await visit(page, '/my-cards')
  await page.getByRole('heading', { name: 'Your renewal sessions' }).waitFor()
  await page.getByText(/Fire hall, /).waitFor()
  expect(complaints).toEqual([])
  await context.close()
})
