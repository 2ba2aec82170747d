import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { BriefingView } from '#shared/schemas/briefing'
import { startSmallCompany, type SmallCompany } from '../support/small-company'
import type { Client } from '../support/client'

let company: SmallCompany
let foreman: Client
beforeAll(async () => {
  company = await startSmallCompany()
  foreman = await company.as('foreman')
})
afterAll(() => company.stop())

interface Problem { data: { code: string, fields?: Record<string, string> } }
const open = (client: Client, body: Record<string, unknown> = {}) => client.post<BriefingView & Problem>('/api/briefings', { siteId: 'site-a', talk: 'hose-whip', work: ['stack'], ...body })

describe('opening a briefing', () => {
  it('answers 201 with who is missing, and the check question without its answer', async () => {
    const { status, body, text } = await open(foreman, { weather: { temperatureF: 34, windMph: 12 }, notes: 'Mind the trench.\nIt is wet.' })
    expect(status).toBe(201)
    expect(body).toMatchObject({ siteId: 'site-a', date: '2026-12-01', talk: 'hose-whip', state: 'open', signIns: [], count: 0, expected: 4, mayRun: true, sheet: null })
    expect(body.missing).toEqual(expect.arrayContaining(['foreman', 'hand-a', 'hand-b', 'hand-c']))
    expect(body.check?.options).toHaveLength(3)
    expect(text).not.toMatch(/"right"|"explain"|"secret"/)
  })

  it('is harmless to repeat with the same id, and refuses an id that is somebody else\'s', async () => {
    const id = randomUUID()
    const first = await open(foreman, { id })
    const again = await open(foreman, { id })
    expect([first.status, again.status]).toEqual([201, 200])
    expect(again.body.id).toBe(id)
    const other = await (await company.as('other-foreman')).post<Problem>('/api/briefings', { id, siteId: 'site-b', talk: 'hose-whip', work: [] })
    expect(other.status).toBe(409)
    expect(other.body.data).toMatchObject({ code: 'idTaken', fields: { id: 'is taken' } })
  })

  it('takes the site\'s date, not the server\'s, and an earlier opening only when there was no signal', async () => {
    const late = await open(foreman, { openedAt: '2026-11-30T02:30:00Z', withoutSignal: true })
    expect(late.body).toMatchObject({ date: '2026-11-29', openedAt: '2026-11-30T02:30:00.000Z', withoutSignal: true })
    const refused = await open(foreman, { openedAt: '2026-12-01T13:00:00Z' })
    expect([refused.status, refused.body.data.fields]).toEqual([422, { openedAt: 'only with withoutSignal' }])
  })

  it.each([
    ['72 hours back and a minute', '2026-11-28T13:29:00Z'],
    ['an hour ahead', '2026-12-01T14:31:00Z'],
  ])('refuses an opening that lies %s', async (_where, openedAt) => {
    expect((await open(foreman, { openedAt, withoutSignal: true })).status).toBe(422)
  })

  it.each([
    [400, { talk: undefined }], [400, { work: 'stack' }], [400, { work: ['paint'] }], [400, { id: 'not-a-uuid' }], [400, { surprise: true }], [400, { weather: { temperatureF: 'hot' } }], [400, { notes: 'x'.repeat(2001) }],
    [422, { talk: 'no-such-talk' }], [422, { pour: 'no-such-pour' }], [404, { siteId: 'nowhere' }], [404, { siteId: 'site-b' }],
  ])('answers %i to %j and writes nothing', async (status, body) => {
    const before = await company.db('briefings').count({ count: '*' }).first()
    expect((await open(foreman, body)).status).toBe(status)
    expect(await company.db('briefings').count({ count: '*' }).first()).toEqual(before)
  })

  it('is for foremen, superintendents and the safety manager', async () => {
    for (const [who, status] of [['hand-a', 403], ['office', 403], ['super', 201], ['safety', 201]] as const) expect([who, (await open(await company.as(who))).status]).toEqual([who, status])
    const badge = company.visitor()
    await badge.post('/api/session', { badge: '100', pin: '730294' })
    expect((await open(badge)).status).toBe(403)
  })
})

describe('reading briefings', () => {
  it('shows all of it within reach, only their own line to a hand, and nothing to others', async () => {
    const { body: { id } } = await open(foreman)
    for (const personId of ['hand-a', 'hand-b']) await foreman.post(`/api/briefings/${id}/sign-ins`, { key: randomUUID(), method: 'foremanDevice', personId, mark: { kind: 'tap' } })
    const own = (await (await company.as('hand-a')).get<BriefingView>(`/api/briefings/${id}`)).body
    expect(own.signIns.map(line => line.personId)).toEqual(['hand-a'])
    expect(own).toMatchObject({ count: 2, mayRun: false })
    expect(own.missing).toBeUndefined()
    expect((await (await company.as('other-hand')).get(`/api/briefings/${id}`)).status).toBe(404)
    expect((await (await company.as('other-foreman')).get(`/api/briefings/${id}`)).status).toBe(404)
    const office = (await (await company.as('office')).get<BriefingView>(`/api/briefings/${id}`)).body
    expect(office).toMatchObject({ count: 2, mayRun: false })
    expect([...office.missing!].sort()).toEqual(['foreman', 'hand-c'])
    expect((await foreman.get('/api/briefings/none')).status).toBe(404)
  })

  it('lists those of one\'s own sites, the latest first', async () => {
    const { body } = await foreman.get<{ items: { siteId: string, date: string }[], total: number }>('/api/briefings?perPage=2&site=site-a')
    expect(body.items).toHaveLength(2)
    expect(body.total).toBeGreaterThan(2)
    expect(body.items.map(item => item.date)).toEqual([...body.items.map(item => item.date)].sort().reverse())
    expect((await (await company.as('other-foreman')).get<{ total: number }>('/api/briefings?site=site-a')).body.total).toBe(0)
    expect((await (await company.as('hand-a')).get<{ total: number }>('/api/briefings')).body.total).toBe(0)
    expect((await foreman.get('/api/briefings?from=yesterday')).status).toBe(400)
  })
})

describe('closing', () => {
  it('ends the talk once; a repeat gives the same, and who signs after is late', async () => {
    const { body: { id } } = await open(foreman)
    const first = await foreman.post<BriefingView>(`/api/briefings/${id}/closing`, {})
    expect([first.status, first.body.state]).toEqual([200, 'closed'])
    const again = await foreman.post<BriefingView>(`/api/briefings/${id}/closing`)
    expect(again.body.closedAt).toBe(first.body.closedAt)
    const late = await foreman.post<{ late: boolean }>(`/api/briefings/${id}/sign-ins`, { key: randomUUID(), method: 'addedByForeman', reason: 'late', personId: 'hand-a', mark: { kind: 'tap' } })
    expect([late.status, late.body.late]).toEqual([201, true])
  })

  it('may not lie before the opening, and is for who runs it', async () => {
    const { body: { id } } = await open(foreman)
    expect((await foreman.post(`/api/briefings/${id}/closing`, { closedAt: '2026-12-01T13:00:00Z' })).status).toBe(422)
    expect((await foreman.post(`/api/briefings/${id}/closing`, { closedAt: 'noon' })).status).toBe(400)
    expect((await (await company.as('other-foreman')).post(`/api/briefings/${id}/closing`, {})).status).toBe(404)
    expect((await (await company.as('office')).post(`/api/briefings/${id}/closing`, {})).status).toBe(403)
    expect((await company.visitor().post(`/api/briefings/${id}/closing`, {})).status).toBe(401)
  })
})

describe('the morning at a site', () => {
  interface Today { expected: number, cleared: number, asked: number, people: { personId: string, state: string, stops: { duty: string, missing: { why: { kind: string } }[] }[] }[], suggestions: { slug: string, score: number, reasons: { kind: string }[] }[], work: string[], briefings: unknown[] }

  it('tells who is expected, who is not cleared for their crew\'s duties and why, and suggests talks with reasons', async () => {
    const { status, body } = await foreman.get<Today>('/api/sites/site-a/today')
    expect(status).toBe(200)
    expect(body).toMatchObject({ expected: 4, cleared: 0, asked: 4, work: ['stack'] })
    expect(body.people[0]!.stops[0]).toMatchObject({ duty: 'stacker', missing: [{ why: { kind: 'neverHeld' } }, { why: { kind: 'neverHeld' } }] })
    expect(body.suggestions[0]!.reasons.map(reason => reason.kind)).toContain('work')
    expect(body.briefings.length).toBeGreaterThan(0)
  })

  it('is not for hands, nor for who leads elsewhere', async () => {
    expect((await (await company.as('hand-a')).get('/api/sites/site-a/today')).status).toBe(403)
    expect((await (await company.as('other-foreman')).get('/api/sites/site-a/today')).status).toBe(404)
    expect((await foreman.get('/api/sites/site-a/today?date=tomorrow')).status).toBe(400)
  })

  it('suggests the same talks for the same morning', async () => {
    const path = '/api/talks/suggestions?site=site-a&date=2026-12-01&work=pour,brace'
    const [first, second] = [await foreman.get<{ items: { slug: string, score: number }[] }>(path), await foreman.get(path)]
    expect(first.text).toBe(second.text)
    expect(first.body.items.length).toBeGreaterThanOrEqual(48)
    expect(first.body.items.map(item => item.score)).toEqual([...first.body.items.map(item => item.score)].sort((a, b) => b - a))
    expect((await foreman.get('/api/talks/suggestions?site=site-a&work=paint')).status).toBe(400)
  })

  it('lists the talks in either language, and gives one to be read in both', async () => {
    const spanish = await foreman.get<{ items: { slug: string, check: { question: string } }[] }>('/api/talks?language=es')
    expect(spanish.body.items.length).toBeGreaterThanOrEqual(48)
    expect(spanish.body.items.find(item => item.slug === 'hose-whip')?.check.question).toContain('bomba')
    const one = await foreman.get<{ body: { en: unknown, es: unknown } }>('/api/talks/hose-whip')
    expect(one.body.body.en).not.toEqual(one.body.body.es)
    expect(one.text).not.toMatch(/"right"|"explain"/)
    expect((await foreman.get('/api/talks/none')).status).toBe(404)
  })
})

describe('weather hazards', () => {
  interface Report { heatIndexF: number | null, windChillF: number | null, evaporation: number | null, hazards: { tag: string, band: string, source: string }[] }
  const ask = (query: string) => foreman.get<Report>(`/api/weather-hazards?${query}`)

  it('works out the published check values, and null where a formula does not apply or a figure is missing', async () => {
    expect((await ask('temperatureF=100&humidity=10')).body.heatIndexF).toBeCloseTo(94.122, 3)
    expect((await ask('temperatureF=40&windMph=20')).body).toMatchObject({ heatIndexF: null, evaporation: null })
    expect(Math.round((await ask('temperatureF=40&windMph=20')).body.windChillF!)).toBe(30)
    expect((await ask('temperatureF=60&windMph=20')).body.windChillF).toBeNull()
    expect((await ask('temperatureF=87&humidity=50&windMph=12&concreteF=80')).body.evaporation).not.toBeNull()
    expect((await ask('')).body).toEqual({ heatIndexF: null, windChillF: null, evaporation: null, hazards: [] })
  })

  it('names each hazard\'s band with its source, and moves a fitting talk up', async () => {
    const { hazards } = (await ask('temperatureF=20&windMph=15')).body
    expect(hazards.map(hazard => hazard.tag)).toEqual(expect.arrayContaining(['cold', 'wind']))
    expect(hazards.every(hazard => hazard.source.length > 0)).toBe(true)
    const suggested = await foreman.get<{ items: { slug: string, reasons: { kind: string, tags?: string[] }[] }[] }>('/api/talks/suggestions?site=site-a&temperatureF=20&windMph=15')
    expect(suggested.body.items.find(item => item.slug === 'cold-hands-wet-cement')!.reasons).toContainEqual({ kind: 'weather', tags: ['cold'] })
  })

  it.each(['temperatureF=warm', 'humidity=101', 'windMph=-1', 'surprise=1'])('answers 400 to %s', async (query) => {
    expect((await ask(query)).status).toBe(400)
  })
})
