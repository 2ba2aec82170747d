import { Validator } from '@seriousme/openapi-schema-validator'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { apiRoutes } from '../support/api-routes'
import { createClient, signedIn } from '../support/client'
import { startServer, type RunningServer } from '../support/server'

describe('the audit trail', () => {
  it('is read by the safety manager, with its chain intact', async () => {
    const safety = await signedIn('safety')
    const list = await safety.get<{ items: { seq: number, action: string }[], total: number }>('/api/audit?perPage=5')
    expect(list.status).toBe(200)
    expect(list.body.items).toHaveLength(5)
    expect(list.body.items[0]!.seq).toBe(list.body.total)
    expect((await safety.get('/api/audit/check')).body).toEqual({ intact: true, rows: list.body.total })
  })

  it('filters by day and refuses nonsense', async () => {
    const office = await signedIn('office')
    expect((await office.get('/api/audit?from=2031-01-01')).body).toMatchObject({ total: 0, items: [] })
    expect((await office.get('/api/audit?from=yesterday')).status).toBe(400)
  })

  it('never tells the reason of a hold', async () => {
    const office = await signedIn('office')
    const answer = await office.get<{ items: { action: string, details: { after: unknown } | null }[] }>('/api/audit?subjectKind=hold&perPage=200')
    expect(answer.status).toBe(200)
    expect(answer.text).not.toContain('"reason":')
  })
})

describe('the description of the API', () => {
  it('is valid OpenAPI 3.1 and names every route', async () => {
    const { body } = await createClient().get<{ paths: Record<string, Record<string, unknown>> }>('/api/openapi.json')
    const result = await new Validator().validate(JSON.parse(JSON.stringify(body)))
    expect(result.errors ?? []).toEqual([])
    const described = Object.entries(body.paths).flatMap(([path, verbs]) => Object.keys(verbs).map(verb => `${verb.toUpperCase()} ${path}`)).sort()
    expect(described).toEqual(apiRoutes().map(route => `${route.method} ${route.path}`).sort())
  })
})

describe('headers', () => {
  let behindTls: RunningServer
  beforeAll(async () => {
    behindTls = await startServer({ env: { NUXT_DEMO: 'true', NUXT_TLS: 'true', NUXT_ORIGIN: 'https://wall.example' } })
  })
  afterAll(() => behindTls.stop())

  it('keep scripts to our own, and the page out of frames', async () => {
    const { headers } = await createClient().get('/sign-in')
    const policy = headers.get('content-security-policy')!
    expect(policy).toContain('\'strict-dynamic\'')
    expect(policy).toContain('frame-ancestors \'none\'')
    expect(policy).not.toContain('upgrade-insecure-requests')
    expect(headers.get('referrer-policy')).toBe('same-origin')
    expect(headers.get('x-content-type-options')).toBe('nosniff')
    expect(headers.get('strict-transport-security')).toBeNull()
  })

  it('ask for https for good only behind TLS', async () => {
    const { headers } = await createClient(behindTls.origin).get('/sign-in')
    expect(headers.get('strict-transport-security')).toMatch(/max-age=\d{8}/)
  })

  it('stand on JSON answers too, which take the light way past the page rules', async () => {
    for (const path of ['/api/health', '/api/nothing', '/api/session']) {
      const { headers } = await createClient().get(path)
      expect([path, headers.get('x-content-type-options')]).toEqual([path, 'nosniff'])
    }
    const page = await createClient().get('/sign-in')
    expect(page.headers.get('content-security-policy')).toContain('nonce-')
  })

  it('keep the session from scripts and from other sites, and from plain http behind TLS', async () => {
    const plain = await createClient().post('/api/session', { email: 'safety@cedarhollow.example', password: 'running-bond' })
    expect(plain.headers.get('set-cookie')).toMatch(/^session=[^;]+;.*HttpOnly/i)
    expect(plain.headers.get('set-cookie')).toMatch(/SameSite=Lax/i)
    expect(plain.headers.get('set-cookie')).not.toMatch(/Secure/i)
    const secure = await fetch(`${behindTls.origin}/api/session`, { method: 'POST', headers: { 'origin': 'https://wall.example', 'content-type': 'application/json' }, body: JSON.stringify({ email: 'safety@cedarhollow.example', password: 'running-bond' }) })
    expect(secure.status).toBe(200)
    expect(secure.headers.get('set-cookie')).toMatch(/Secure/i)
  })
})
