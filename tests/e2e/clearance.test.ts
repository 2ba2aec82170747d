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
const siteNamed = async (name: string) => (await (await signedIn('safety')).get<{ items: { id: string, name: string }[] }>('/api/sites')).body.items.find(site => site.name === name)!.id

test('the board answers for a site and a day, is walked by arrow keys, and moving the date shows the future', async () => {
  const { page, context, complaints } = await openAs('safety')
  const site = await siteNamed('Quarry Lane Townhomes')
  await visit(page, `/board?site=${site}`)
  await page.getByRole('heading', { level: 1, name: /is 1 short$/ }).waitFor()
  const squares = page.locator('[data-square]')
  await squares.first().focus()
  await page.keyboard.press('ArrowDown')
  await page.keyboard.press('ArrowRight')
  expect(await page.evaluate(() => (document.activeElement as HTMLElement).dataset.square)).toBe('1-1')
  await page.keyboard.press('Enter')
  await page.getByRole('dialog').waitFor()
  await page.keyboard.press('Escape')
  await page.getByRole('dialog').waitFor({ state: 'hidden' })

  const hoseNow = await page.getByRole('columnheader', { name: /^Hose hand/ }).textContent()
  const later = new Date(Date.now() + 700 * 86_400_000).toISOString().slice(0, 10)
  await page.getByLabel('Day', { exact: true }).fill(later)
  await page.getByLabel('Day', { exact: true }).blur()
  await expect.poll(() => page.getByRole('columnheader', { name: /^Hose hand/ }).textContent()).not.toBe(hoseNow)
  expect(new URL(page.url()).searchParams.get('date')).toBe(later)
  expect(complaints).toEqual([])
  await context.close()
})

test('a day that is short says which duties share too few people, and its shortest fix invites the person to the module', async () => {
  const { page, context, complaints } = await openAs('safety')
  await visit(page, `/plan?site=${await siteNamed('Quarry Lane Townhomes')}`)
  await page.getByRole('heading', { level: 1, name: /^Short by 1 of/ }).waitFor()
  await page.getByText(/Hose hand.*Pump spotter.*share too few people/).waitFor()
  await page.getByText(/Shortest fix: \d+ minutes/).waitFor()
  await page.getByRole('button', { name: 'Invite them to these modules' }).click()
  await page.getByText(/invitation is on its way|No e-mail address/).first().waitFor()
  expect(complaints).toEqual([])
  await context.close()
})

test('a foreman finds on the phone who can do a duty today', async () => {
  const { page, context, complaints } = await openAs('foreman', phone)
  await visit(page, '/crew')
  await page.getByRole('link', { name: 'Who can do what, by duty' }).click()
  await page.getByLabel('Duty', { exact: true }).selectOption('stacker')
  await page.getByRole('heading', { level: 1, name: /^\d+ of \d+ are cleared for Stacker$/ }).waitFor()
  await page.getByRole('button', { name: /Andre Whitlock/ }).click()
  await page.getByRole('dialog').getByText('Stacker: cleared').waitFor()
  expect(complaints).toEqual([])
  await context.close()
})

test('a hand with booked practice learns beside a cleared one, shown on the day\'s plan, and a placement by hand is kept', async () => {
  const safety = await signedIn('safety')
  const site = await siteNamed('Sagebrush Commons')
  type People = { people: { personId: string, name: string, duties: { state: string, missing: { anyOf: string[] }[] }[] }[] }
  const { people } = (await safety.get<People>(`/api/clearance?site=${site}&duty=rebar-hand`)).body
  const learner = people.find(one => one.duties[0]!.state === 'notCleared' && one.duties[0]!.missing.length === 1 && one.duties[0]!.missing[0]!.anyOf.includes('steel'))!
  const cleared = people.filter(one => one.duties[0]!.state === 'cleared')
  const { today } = (await safety.get<{ today: string }>('/api/company')).body
  await safety.post('/api/renewals', { type: 'steel', siteId: site, place: 'North wall', trainer: 'Iris Lang', date: today, time: '23:30', minutes: 60, seats: 1, personIds: [learner.personId] })

  const { page, context, complaints } = await openAs('safety')
  await visit(page, `/plan?site=${site}`)
  await page.getByText('Change the places').click()
  for (const box of await page.getByRole('spinbutton').all()) {
    await box.fill('0')
    await box.blur()
  }
  await page.getByRole('spinbutton', { name: 'Rebar hand' }).fill('1')
  await page.getByRole('spinbutton', { name: 'Rebar hand' }).blur()
  await page.getByText(new RegExp(`^${learner.name} learns beside `)).waitFor()
  const other = cleared.find(one => one.name !== undefined)!
  const by = (await page.getByText(new RegExp(`^${learner.name} learns beside `)).textContent())!.split(' learns beside ')[1]!.trim()
  const wanted = cleared.find(one => one.name !== by) ?? other
  await page.getByRole('listitem').filter({ hasText: 'Rebar hand' }).getByLabel('Place by hand:').selectOption({ label: wanted.name })
  await page.getByText(new RegExp(`^${learner.name} learns beside ${wanted.name}`)).waitFor()
  await page.getByText('by hand').first().waitFor()
  expect(complaints).toEqual([])
  await context.close()
})
