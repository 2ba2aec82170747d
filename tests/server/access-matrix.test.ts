import { beforeAll, describe, expect, it } from 'vitest'
import { can, type Ability } from '../../shared/access/abilities'
import type { Role } from '../../shared/domain/states'
import { apiRoutes } from '../support/api-routes'
import { createClient, signedIn, type Client, type DemoPerson } from '../support/client'

const routes = apiRoutes()
const closed = routes.filter(route => route.ability !== 'public')
const changing = routes.filter(route => route.method !== 'GET')
const people: Record<Role, DemoPerson> = { worker: 'installer', foreman: 'foreman', superintendent: 'super', safety: 'safety', admin: 'office' }
const clients = {} as Record<Role, Client>
const somewhere = (path: string) => path.replace(/\{\w+\}/g, '00000000-0000-4000-8000-000000000000')

function call(client: Client, method: string, path: string, headers?: Record<string, string>) {
  if (method === 'GET') return client.get(path)
  if (method === 'POST') return client.post(path, {}, headers)
  if (method === 'PATCH') return client.patch(path, {})
  if (method === 'PUT') return client.put(path, {})
  return client.delete(path)
}

beforeAll(async () => {
  for (const role of Object.keys(people) as Role[]) clients[role] = await signedIn(people[role])
})

describe('without a session', () => {
  it.each(closed.map(route => [`${route.method} ${route.path}`, route] as const))('%s answers 401', async (_name, route) => {
    const answer = await call(createClient(), route.method, somewhere(route.path))
    expect(answer.status).toBe(401)
    expect(answer.body).toMatchObject({ data: { code: 'notSignedIn' } })
  })
})

describe.each(Object.keys(people) as Role[])('as %s', (role) => {
  const refused = closed.filter(route => !can({ role }, route.ability as Ability))
  const allowed = closed.filter(route => can({ role }, route.ability as Ability) && route.path.includes('{') && !/session|calendar/.test(route.path))

  it('is refused with 403 exactly where the role lacks the ability', async () => {
    for (const route of refused) {
      const answer = await call(clients[role], route.method, somewhere(route.path))
      expect([answer.status, `${route.method} ${route.path}`]).toEqual([403, `${route.method} ${route.path}`])
    }
  })

  it('never learns that a foreign or missing id exists, and never meets a 500', async () => {
    for (const route of allowed) {
      const answer = await call(clients[role], route.method, somewhere(route.path))
      expect([400, 404, 403, 409, 422], `${route.method} ${route.path} answered ${answer.status}`).toContain(answer.status)
    }
  })
})

describe('a change', () => {
  it.each(changing.map(route => [`${route.method} ${route.path}`, route] as const))('%s needs a matching Origin', async (_name, route) => {
    const answer = await fetch(clients.safety.origin + somewhere(route.path), { method: route.method, headers: { 'origin': 'https://elsewhere.example', 'content-type': 'application/json', 'cookie': [...clients.safety.cookies].map(pair => pair.join('=')).join('; ') }, body: '{}' })
    expect(answer.status).toBe(403)
    expect(await answer.json()).toMatchObject({ data: { code: 'wrongOrigin' } })
  })

  it('without any Origin is refused too', async () => {
    const answer = await fetch(`${clients.safety.origin}/api/session`, { method: 'POST', headers: { 'content-type': 'application/json' }, body: '{}' })
    expect(answer.status).toBe(403)
  })
})

describe('answers of the API', () => {
  it('are never stored by browsers or proxies', async () => {
    for (const path of ['/api/session', '/api/credentials', '/api/health']) expect((await clients.safety.get(path)).headers.get('cache-control')).toContain('no-store')
  })

  it('refuse unknown fields, broken JSON, other types and too much, without a 500', async () => {
    const client = createClient()
    expect((await client.post('/api/session', { email: 'a@b.example', password: 'x', admin: true })).body).toMatchObject({ statusCode: 400, data: { code: 'invalid' } })
    const send = (body: string, type = 'application/json') => fetch(`${client.origin}/api/session`, { method: 'POST', headers: { 'origin': client.origin, 'content-type': type }, body })
    expect((await send('{"email":')).status).toBe(400)
    expect((await send('null')).status).toBe(400)
    expect((await send('[]')).status).toBe(400)
    expect((await send('{}', 'text/plain')).status).toBe(415)
    expect((await send(JSON.stringify({ email: 'x'.repeat(1_100_000), password: 'x' }))).status).toBe(413)
    expect((await send('{"email":"a\\u0000b","password":"x"}')).status).toBe(400)
    expect((await client.get('/api/%E0%A4%A')).status).toBeLessThan(500)
  })
})
