import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { signedIn, type Client } from '../support/client'
import { startServer, type RunningServer } from '../support/server'

interface Sites { sites: { id: string, name: string, date: string, isRostered: boolean }[] }
interface Duty { duty: string, state: string, missing: { anyOf: string[], why: { kind: string } }[] }
interface Today { expected: number, people: { personId: string, name: string, duties: Duty[] }[], openBriefing: unknown, suggestions: { slug: string, reasons: unknown[] }[], lastTalks: { date: string }[] }
interface Modules { items: { slug: string, title: string, state: string, lessons: unknown[] }[] }

describe('the demo company for who walks in', () => {
  let foreman: Client
  let installer: Client
  let newHire: Client
  let site: Sites['sites'][number]
  let today: Today
  // A server of its own: this is about the company as it is seeded, before anybody did anything.
  let server: RunningServer
  beforeAll(async () => {
    server = await startServer({ env: { NUXT_DEMO: 'true', NUXT_CLOCK: '2026-12-01T13:30:00Z' } })
    ;[foreman, installer, newHire] = await Promise.all((['foreman', 'installer', 'newHire'] as const).map(who => signedIn(who, server.origin))) as [Client, Client, Client]
    site = (await foreman.get<Sites>('/api/session/sites')).body.sites[0]!
    today = (await foreman.get<Today>(`/api/sites/${site.id}/today`)).body
  })

  afterAll(() => server.stop())

  const dutyOf = (name: string, duty: string) => today.people.find(person => person.name === name)?.duties.find(one => one.duty === duty)

  it('has foreman, installer and new hire rostered at the same first site today', async () => {
    expect(site).toMatchObject({ name: 'Sagebrush Commons', isRostered: true, date: '2026-12-01' })
    for (const client of [installer, newHire]) expect((await client.get<Sites>('/api/session/sites')).body.sites[0]).toMatchObject({ id: site.id, isRostered: true })
    const names = today.people.map(person => person.name)
    expect(names).toEqual(expect.arrayContaining(['Hector Zamora', 'Andre Whitlock', 'Yesenia Cruz']))
    expect(today.expected).toBe(names.length)
  })

  it('clears foreman and installer to stack, and says what the new hire lacks', () => {
    expect(dutyOf('Hector Zamora', 'stacker')?.state).toBe('cleared')
    expect(dutyOf('Andre Whitlock', 'stacker')?.state).toBe('cleared')
    const stacker = dutyOf('Yesenia Cruz', 'stacker')
    expect(stacker?.state).toBe('notCleared')
    expect(stacker?.missing.map(one => [one.anyOf, one.why.kind])).toEqual([[['stacking'], 'neverHeld'], [['running-bond'], 'neverHeld']])
  })

  it('offers talks with reasons, and knows the last ones', () => {
    expect(today.suggestions.length).toBeGreaterThanOrEqual(3)
    expect(today.suggestions.every(one => one.reasons.length > 0)).toBe(true)
    expect(today.lastTalks[0]?.date).toBe('2026-11-30')
  })

  it('shows a hold to the foreman without its reason', async () => {
    const text = (await foreman.get(`/api/sites/${site.id}/today`)).text
    expect(text).toContain('"onHold"')
    expect(text).not.toContain('hung load')
  })

  it('has stacking open and not started for the new hire, in Spanish', async () => {
    const { items } = (await newHire.get<Modules>('/api/modules')).body
    expect(items.find(module => module.slug === 'stacking')).toMatchObject({ title: 'Apilar bloques', state: 'open' })
    expect(items.filter(module => module.state === 'laid').map(module => module.slug)).toEqual(['ready-for-site', 'working-at-height', 'what-the-wall-is-made-of', 'footings-and-layout', 'tools-and-cutting'])
    expect(items.filter(module => module.state === 'open').map(module => module.slug)).toEqual(['running-bond', 'stacking', 'steel'])
  })

  it('has both blocks laid for the installer', async () => {
    const { items } = (await installer.get<Modules>('/api/modules')).body
    expect(items.filter(module => ['stacking', 'running-bond'].includes(module.slug)).map(module => module.state)).toEqual(['laid', 'laid'])
  })

  it('lets the foreman see the hands-on that somebody of the crew waits for', async () => {
    const { items } = (await foreman.get<{ items: { person: string, module: string, quizPassed: boolean }[] }>('/api/sign-off-requests')).body
    expect(items).toContainEqual(expect.objectContaining({ person: 'Samuel Adeyemi', module: 'stacking', quizPassed: true }))
  })

  it('shows the safety manager what runs out in the next 60 days and what already did', async () => {
    const safety = await signedIn('safety', server.origin)
    const due = (await safety.get<{ total: number }>('/api/credentials?within=60')).body.total
    const all = (await safety.get<{ total: number }>('/api/credentials?within=60&includeExpired=true')).body.total
    expect(due).toBeGreaterThanOrEqual(20)
    expect(all - due).toBe(6)
  })

  it('checks a past morning\'s sheet for a stranger', async () => {
    const { items } = (await foreman.get<{ items: { id: string, state: string, date: string }[] }>(`/api/briefings?site=${site.id}`)).body
    const past = items.find(briefing => briefing.date < '2026-12-01')!
    expect(past.state).toBe('sealed')
    const { hash } = (await foreman.get<{ hash: string }>(`/api/briefings/${past.id}/sheet.json`)).body
    expect((await fetch(`${foreman.origin}/api/checks/sheets/${hash}`).then(answer => answer.json()))).toMatchObject({ intact: true, date: past.date })
  })
})
