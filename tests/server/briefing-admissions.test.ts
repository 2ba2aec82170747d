import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { AdmissionView } from '#shared/schemas/briefing'
import { briefingSteps, type Problem } from '../support/briefing-steps'
import type { Client } from '../support/client'
import { startSmallCompany, type SmallCompany } from '../support/small-company'

let company: SmallCompany
let foreman: Client
let steps: ReturnType<typeof briefingSteps>
beforeAll(async () => {
  company = await startSmallCompany()
  foreman = await company.as('foreman')
  steps = briefingSteps(company, foreman)
})
afterAll(() => company.stop())

const enter = <Body>(client: Client, id: string, code: unknown) => client.post<Body>(`/api/briefings/${id}/admissions`, { code })

describe('the presence code', () => {
  it('is the RFC 6238 code of the briefing\'s secret, inside a link to the site\'s page', async () => {
    const id = await steps.open()
    const shown = await steps.presence(id)
    expect((await steps.totp(id)).generate({ timestamp: Date.parse(shown.validUntil) - 1 })).toBe(shown.code)
    expect(shown.url).toBe(`${company.server.origin}/s/QUARRY?b=${id}&c=${shown.code}`)
  })

  it('is for who runs the briefing', async () => {
    const id = await steps.open()
    expect((await (await company.as('hand-a')).get(`/api/briefings/${id}/presence`)).status).toBe(403)
    expect((await (await company.as('other-foreman')).get(`/api/briefings/${id}/presence`)).status).toBe(404)
    expect((await company.visitor().get(`/api/briefings/${id}/presence.svg`)).status).toBe(401)
    const picture = await foreman.get(`/api/briefings/${id}/presence.svg`)
    expect([picture.headers.get('content-type'), picture.text.slice(0, 4)]).toEqual(['image/svg+xml', '<svg'])
  })
})

describe('an admission', () => {
  it('is what a right code turns into at once, until the end of the site\'s day', async () => {
    const id = await steps.open()
    const { code } = await steps.presence(id)
    const answer = await enter<AdmissionView>(company.visitor(), id, ` ${code.slice(0, 3)} ${code.slice(3)} `)
    expect(answer.status).toBe(201)
    expect(answer.body).toMatchObject({ until: '2026-12-02T07:00:00Z', talk: 'capped-bars' })
    expect(answer.headers.getSetCookie().join()).toMatch(/browser=.*HttpOnly/i)
    expect(answer.text).not.toMatch(/"right"|"explain"/)
  })

  it('takes the code of the step before, and refuses the one before that', async () => {
    const id = await steps.open()
    const totp = await steps.totp(id)
    const stepStart = Date.parse((await steps.presence(id)).validUntil) - 30_000
    const before = await enter(company.visitor(), id, totp.generate({ timestamp: stepStart - 1 }))
    const stale = await enter<Problem>(company.visitor(), id, totp.generate({ timestamp: stepStart - 60_001 }))
    expect(before.status).toBe(201)
    expect([stale.status, stale.body.data.code]).toEqual([422, 'wrongCode'])
  })

  it('makes one browser wait after five wrong codes, a right one included, and no other; the seal is judged before the wait', async () => {
    const id = await steps.open()
    const guesser = company.visitor()
    const { code } = await steps.presence(id)
    const statuses = []
    for (let index = 0; index < 5; index++) statuses.push((await enter(guesser, id, code === '000000' ? '000001' : '000000')).status)
    expect(statuses).toEqual([422, 422, 422, 422, 422])
    const waiting = await enter<Problem>(guesser, id, code)
    expect(waiting.status).toBe(429)
    expect(Number(waiting.headers.get('retry-after'))).toBeGreaterThan(20)
    expect((await steps.admit(id)).admission).toBeTruthy()
    await steps.seal(id)
    const sealed = await enter<Problem>(guesser, id, code)
    expect([sealed.status, sealed.body.data.code]).toEqual([409, 'sealed'])
  })

  it('slows only browsers without a session once a hundred wrong codes came within a minute', async () => {
    const id = await steps.open()
    const hand = await company.as('hand-b')
    await Promise.all(Array.from({ length: 100 }, () => enter(company.visitor(), id, '12345')))
    const { code } = await steps.presence(id)
    expect((await enter(company.visitor(), id, code)).status).toBe(429)
    expect((await enter(hand, id, code)).status).toBe(201)
  })

  it('answers 404 for no such briefing and 400 for no code', async () => {
    expect((await enter(company.visitor(), 'none', '123456')).status).toBe(404)
    expect((await enter(company.visitor(), await steps.open(), undefined)).status).toBe(400)
    expect((await enter(company.visitor(), await steps.open(), 123456)).status).toBe(400)
  })

  it('opens the talk\'s text to its own browser only', async () => {
    const id = await steps.open()
    const { client } = await steps.admit(id)
    expect((await client.get<{ slug: string }>(`/api/briefings/${id}/admission`)).body.slug).toBe('capped-bars')
    expect((await company.visitor().get(`/api/briefings/${id}/admission`)).status).toBe(404)
  })
})
