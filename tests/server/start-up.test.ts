import { afterAll, describe, expect, it } from 'vitest'
import { createClient, signedIn } from '../support/client'
import { startServer, type RunningServer } from '../support/server'

const started: RunningServer[] = []
async function start(env: Record<string, string>, folder?: string) {
  const server = await startServer({ env, folder })
  started.push(server)
  return server
}
afterAll(() => Promise.all(started.map(server => server.stop())))

describe('a server that starts', () => {
  it('answers this machine only in the demo, whose password everybody knows', async () => {
    expect((await start({ NUXT_DEMO: 'true', HOST: '' })).log()).toContain('Listening on http://127.0.0.1:')
  })

  it('answers everybody without the demo, and prints the token of an empty database', async () => {
    const server = await start({ HOST: '' })
    expect(server.log()).toMatch(/Listening on http:\/\/(\[::\]|0\.0\.0\.0):/)
    expect(server.log()).toMatch(/Open \/setup and type this token: [0-9A-Z]{12}/)
  })

  it('says loudly that its clock was set', async () => {
    const server = await start({ NUXT_CLOCK: '2026-12-01T13:30:00Z' })
    expect(server.log()).toContain('NUXT_CLOCK is set')
    expect((await createClient(server.origin).get('/api/server-notes')).body).toEqual({ isDemo: false, isClockSet: true })
  })

  it('keeps its data when it starts again, and seeds nothing twice', async () => {
    const first = await start({ NUXT_DEMO: 'true' })
    const people = async (origin: string) => (await (await signedIn('office', origin)).get<{ total: number }>('/api/people')).body.total
    const before = await people(first.origin)
    await first.stop()
    const second = await start({ NUXT_DEMO: 'true' }, first.folder)
    expect(await people(second.origin)).toBe(before)
  })

  it('takes the first admin once, with the printed token and a long password', async () => {
    const server = await start({})
    const client = createClient(server.origin)
    const token = /token: ([0-9A-Z]+)/.exec(server.log())![1]!
    const body = { token, company: { name: 'Mill Creek Forms', timeZone: 'America/Chicago' }, admin: { name: 'Ida Brandt', email: 'ida@millcreek.example', password: 'seven quiet herons wade' } }
    expect((await client.post('/api/setup', { ...body, token: 'WRONGWRONG12' })).status).toBeGreaterThanOrEqual(400)
    expect((await client.post('/api/setup', { ...body, admin: { ...body.admin, password: 'short' } })).status).toBe(422)
    expect((await client.post('/api/setup', { ...body, company: { ...body.company, timeZone: 'America/Nowhere' } })).status).toBe(400)
    expect((await client.post('/api/setup', body)).status).toBeLessThan(300)
    expect((await createClient(server.origin).post('/api/setup', body)).status).toBeGreaterThanOrEqual(400)
    const admin = createClient(server.origin)
    expect((await admin.post('/api/session', { email: 'ida@millcreek.example', password: 'seven quiet herons wade' })).body).toMatchObject({ person: { role: 'admin' } })
  })
})
