import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, inject, it } from 'vitest'
import { axeFindings, desk, narrow, openBrowser, openDevice, sidewaysScroll, visit } from '../support/browser'
import { createClient, signedIn, type Client, type DemoPerson } from '../support/client'
import { filesBelow } from '../support/project-files'

type Who = DemoPerson | 'nobody'
interface Visit { page: string, as: Who, path: (ids: Ids) => string, sizes?: ('narrow' | 'desk')[] }
interface Ids { person: string, credential: string, briefing: string, signOff: string, site: string, hash: string, card: string, talk: string, join: string, reset: string, packet: string, renewal: string }

/** Every page of the product, by its file, and who looks at it. */
const visits: Visit[] = [
  { page: 'account.vue', as: 'foreman', path: () => '/account' },
  { page: 'audit.vue', as: 'safety', path: () => '/audit' },
  { page: 'board.vue', as: 'safety', path: () => '/board' },
  { page: 'board.vue', as: 'foreman', path: () => '/board?duty=hose-hand' },
  { page: 'briefings/[id].vue', as: 'foreman', path: ids => `/briefings/${ids.briefing}` },
  { page: 'briefings/index.vue', as: 'safety', path: () => '/briefings' },
  { page: 'check/[hash].vue', as: 'nobody', path: ids => `/check/${ids.hash}` },
  { page: 'credentials/[id].vue', as: 'safety', path: ids => `/credentials/${ids.credential}` },
  { page: 'credentials/index.vue', as: 'safety', path: () => '/credentials?within=60&includeExpired=true' },
  { page: 'credentials/index.vue', as: 'foreman', path: () => '/credentials' },
  { page: 'credentials/new.vue', as: 'installer', path: () => '/credentials/new' },
  { page: 'crew/index.vue', as: 'foreman', path: () => '/crew' },
  { page: 'crew/wall.vue', as: 'foreman', path: () => '/crew/wall' },
  { page: 'crews.vue', as: 'office', path: () => '/crews' },
  { page: 'forgot.vue', as: 'nobody', path: () => '/forgot' },
  { page: 'imports.vue', as: 'office', path: () => '/imports' },
  { page: 'index.vue', as: 'installer', path: () => '/' },
  { page: 'index.vue', as: 'foreman', path: () => '/' },
  { page: 'index.vue', as: 'safety', path: () => '/' },
  { page: 'item-review/[item].vue', as: 'safety', path: () => '/item-review/stacking-01' },
  { page: 'item-review/index.vue', as: 'safety', path: () => '/item-review?module=stacking' },
  { page: 'join/[token].vue', as: 'nobody', path: ids => ids.join },
  { page: 'kept.vue', as: 'installer', path: () => '/kept' },
  { page: 'learn/[module]/[lesson].vue', as: 'newHire', path: () => '/learn/stacking/level-and-plumb' },
  { page: 'learn/[module]/index.vue', as: 'newHire', path: () => '/learn/stacking' },
  { page: 'learn/[module]/note.vue', as: 'safety', path: () => '/learn/stacking/note' },
  { page: 'learn/[module]/quiz.vue', as: 'installer', path: () => '/learn/stacking/quiz' },
  { page: 'learn/index.vue', as: 'newHire', path: () => '/learn' },
  { page: 'look-ahead.vue', as: 'safety', path: () => '/look-ahead' },
  { page: 'mail.vue', as: 'office', path: () => '/mail' },
  { page: 'more.vue', as: 'super', path: () => '/more' },
  { page: 'my-cards.vue', as: 'installer', path: () => '/my-cards' },
  { page: 'near-misses.vue', as: 'installer', path: () => '/near-misses' },
  { page: 'near-misses.vue', as: 'safety', path: () => '/near-misses' },
  { page: 'packet/[token].vue', as: 'nobody', path: ids => ids.packet },
  { page: 'packets.vue', as: 'safety', path: () => '/packets' },
  { page: 'recheck.vue', as: 'nobody', path: () => '/recheck' },
  { page: 'renewals/index.vue', as: 'safety', path: () => '/renewals' },
  { page: 'renewals/[id].vue', as: 'safety', path: ids => `/renewals/${ids.renewal}` },
  { page: 'people/[id].vue', as: 'safety', path: ids => `/people/${ids.person}` },
  { page: 'people/[id].vue', as: 'foreman', path: ids => `/people/${ids.person}` },
  { page: 'people/index.vue', as: 'office', path: () => '/people' },
  { page: 'people/new.vue', as: 'office', path: () => '/people/new' },
  { page: 'plan.vue', as: 'safety', path: () => '/plan' },
  { page: 'questions.vue', as: 'installer', path: () => '/questions' },
  { page: 'requirements.vue', as: 'safety', path: () => '/requirements' },
  { page: 'reset/[token].vue', as: 'nobody', path: ids => ids.reset },
  { page: 's/[siteCode].vue', as: 'nobody', path: ids => `/s/${ids.site}` },
  { page: 'settings.vue', as: 'office', path: () => '/settings' },
  { page: 'setup.vue', as: 'nobody', path: () => '/setup' },
  { page: 'sign-in.vue', as: 'nobody', path: () => '/sign-in' },
  { page: 'sign-offs/[id].vue', as: 'foreman', path: ids => `/sign-offs/${ids.signOff}` },
  { page: 'sign-offs/index.vue', as: 'foreman', path: () => '/sign-offs' },
  { page: 'sign-offs/read.vue', as: 'foreman', path: () => '/sign-offs/read' },
  { page: 'sites.vue', as: 'office', path: () => '/sites' },
  { page: 'talks/[slug]/edit.vue', as: 'safety', path: ids => `/talks/${ids.talk}/edit` },
  { page: 'talks/[slug]/index.vue', as: 'foreman', path: () => '/talks/hose-whip' },
  { page: 'talks/index.vue', as: 'foreman', path: () => '/talks?work=pour' },
  { page: 'talks/write.vue', as: 'safety', path: () => '/talks/write?from=hose-whip' },
  { page: 'training-minutes.vue', as: 'safety', path: () => '/training-minutes' },
  { page: 'verify/[code].vue', as: 'nobody', path: ids => `/verify/${ids.card}` },
]
interface List<Item> { items: Item[] }

/** What the pages with an id are looked at with; a link that is over is a page too. */
async function findIds(): Promise<Ids> {
  const [safety, foreman, office, installer] = await Promise.all((['safety', 'foreman', 'office', 'installer'] as const).map(who => signedIn(who))) as [Client, Client, Client, Client]
  const own = (await installer.get<List<{ id: string }>>('/api/credentials')).body.items[0]!
  const card = (await installer.get<{ cardCode?: string, code?: string }>(`/api/credentials/${own.id}`)).body
  const sites = (await foreman.get<{ sites: { id: string, code: string }[] }>('/api/session/sites')).body.sites
  const briefings = (await foreman.get<List<{ id: string, state: string }>>(`/api/briefings?site=${sites[0]!.id}`)).body.items
  const sealed = briefings.find(row => row.state === 'sealed')!
  const sheet = (await foreman.get<{ hash: string }>(`/api/briefings/${sealed.id}/sheet.json`)).body
  const requests = (await foreman.get<List<{ id: string }>>('/api/sign-off-requests')).body.items
  const person = (await safety.get<List<{ id: string }>>(`/api/people?q=2041`)).body.items[0]!
  const newcomer = (await office.post<{ id: string }>('/api/people', { name: 'Nadia Link', badge: `N${Date.now()}` })).body
  const join = (await office.post<{ url: string }>(`/api/people/${newcomer.id}/join-link`)).body
  const talk = (await safety.post<{ slug: string }>('/api/company-talks', { title: { en: 'Our gate', es: 'Nuestra entrada' }, minutes: 5, work: ['drive'], hazards: ['traffic'], seasons: [], text: { en: '## Ask first\n\nWho opens the gate?', es: '## Pregunte primero\n\n¿Quién abre?' }, sources: ['Company rule'], check: { question: { en: 'Who?', es: '¿Quién?' }, options: ['a', 'b', 'c'].map(id => ({ id, text: { en: `Person ${id}`, es: `Persona ${id}` } })), right: 'a', explain: { en: 'The one named.', es: 'La persona nombrada.' } } })).body.slug
  const packet = new URL((await safety.post<{ url: string }>('/api/packets', { siteId: sites[0]!.id, endsOn: new Date(Date.now() + 864e5 * 9).toISOString().slice(0, 10), parts: ['duties', 'credentials', 'sheets'] })).body.url).pathname
  const renewal = (await safety.post<{ id: string }>('/api/renewals', { type: 'heat-illness', siteId: sites[0]!.id, place: 'Yard trailer', trainer: 'Iris Lang', date: new Date(Date.now() + 864e5 * 5).toISOString().slice(0, 10), time: '06:00', minutes: 60, seats: 3, personIds: [person.id] })).body.id
  return { person: person.id, packet, renewal, talk, credential: own.id, briefing: sealed.id, signOff: requests[0]!.id, site: sites[0]!.code, hash: sheet.hash, card: card.cardCode ?? card.code ?? 'NONE', join: new URL(join.url).pathname, reset: '/reset/this-link-has-been-used-long-ago' }
}

describe('every page', () => {
  let browser: Browser
  let ids: Ids
  beforeAll(async () => {
    browser = await openBrowser()
    ids = await findIds()
  })
  afterAll(() => browser.close())

  it('is on the list of this test', () => {
    expect([...new Set(visits.map(one => one.page))].sort()).toEqual(filesBelow('pages', '.vue'))
  })

  async function look(one: Visit, size: 'narrow' | 'desk') {
    const { context, page, complaints } = await openDevice(browser, { size: size === 'desk' ? desk : narrow, language: 'en' })
    if (one.as !== 'nobody') {
      const client: Client = one.as === 'newHire' ? await signedIn('newHire') : await signedIn(one.as)
      await context.addCookies([...client.cookies].map(([name, value]) => ({ name, value, url: inject('origin') })))
    }
    await visit(page, one.path(ids))
    await page.waitForLoadState('networkidle')
    const found = { axe: await axeFindings(page), sideways: await sidewaysScroll(page), headings: await page.locator('h1').count(), lang: await page.locator('html').getAttribute('lang') }
    await context.close()
    return { ...found, complaints: complaints.filter(text => !(one.page === 'reset/[token].vue' && text.includes('404'))) }
  }

  it.each(visits.map(one => [`${one.page} as ${one.as}`, one] as const))('%s passes axe, scrolls nowhere sideways at 320 px and complains of nothing', async (_name, one) => {
    for (const size of ['narrow', 'desk'] as const) {
      expect({ size, ...await look(one, size) }).toEqual({ size, axe: [], sideways: 0, headings: 1, lang: one.as === 'newHire' ? 'es' : 'en', complaints: [] })
    }
  })

  it('keeps a stranger out of what needs a session, and brings them back after signing in', async () => {
    const { context, page } = await openDevice(browser)
    await visit(page, '/credentials?within=30')
    expect(new URL(page.url()).pathname).toBe('/sign-in')
    expect(new URL(page.url()).searchParams.get('next')).toBe('/credentials?within=30')
    await context.close()
    expect((await createClient().get('/api/credentials')).status).toBe(401)
  })
})
