import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { briefingSteps } from '../support/briefing-steps'
import type { Client } from '../support/client'
import { smallCompanySecrets, startSmallCompany, type SmallCompany } from '../support/small-company'

let company: SmallCompany
let foreman: Client
let steps: ReturnType<typeof briefingSteps>
beforeAll(async () => {
  company = await startSmallCompany()
  foreman = await company.as('foreman')
  steps = briefingSteps(company, foreman)
})
afterAll(() => company.stop())
const { pin } = smallCompanySecrets

describe('signing in on one\'s own phone', () => {
  it('takes the session, a badge with its PIN, or a visitor', async () => {
    const id = await steps.open()
    const known = await steps.admit(id, await company.as('hand-a'))
    const badge = await steps.admit(id)
    const guest = await steps.admit(id)
    expect((await steps.byPhone(known.client, id, known.admission)).body).toMatchObject({ name: 'Wren Abbott', method: 'ownPhone', late: false, count: 1 })
    expect((await steps.byPhone(badge.client, id, badge.admission, { badge: '102', pin, language: 'es' })).body).toMatchObject({ personId: 'hand-b', language: 'es', count: 2 })
    expect((await steps.byPhone(guest.client, id, guest.admission, { visitor: { name: 'Ada Cole', company: 'Redpump', host: 'Ines' } })).body).toMatchObject({ visitor: { name: 'Ada Cole', company: 'Redpump', host: 'Ines' }, count: 3 })
    expect((await badge.client.get('/api/session')).status).toBe(401)
    const { signIns, missing } = await steps.view(id)
    expect(signIns.map(line => line.name)).toEqual(['Wren Abbott', 'Lupe Ferrer', 'Ada Cole'])
    expect([...missing!].sort()).toEqual(['foreman', 'hand-c'])
  })

  it('answers 200 with the first for a repeat of the key or the person', async () => {
    const id = await steps.open()
    const { client, admission } = await steps.admit(id, await company.as('hand-a'))
    const key = randomUUID()
    const first = await steps.byPhone(client, id, admission, { key })
    const sameKey = await steps.byPhone(client, id, admission, { key })
    const again = await steps.admit(id, client)
    const samePerson = await steps.byPhone(client, id, again.admission)
    expect([first.status, sameKey.status, samePerson.status]).toEqual([201, 200, 200])
    expect([sameKey.body.id, samePerson.body.id]).toEqual([first.body.id, first.body.id])
    expect((await steps.view(id)).count).toBe(1)
  })

  it('writes one line when the same person signs many times at once', async () => {
    const id = await steps.open()
    const { client, admission } = await steps.admit(id, await company.as('hand-a'))
    const answers = await Promise.all(Array.from({ length: 12 }, () => steps.byPhone(client, id, admission)))
    expect(answers.map(answer => answer.status).sort()).toEqual([...Array<number>(11).fill(200), 201])
    expect((await steps.view(id)).count).toBe(1)
  })

  it('is for one person an admission: the second on the same phone scans again', async () => {
    const id = await steps.open()
    const { client, admission } = await steps.admit(id)
    expect((await steps.byPhone(client, id, admission, { badge: '101', pin })).status).toBe(201)
    const second = await steps.byPhone(client, id, admission, { badge: '103', pin })
    expect([second.status, second.body.data.code]).toEqual([409, 'admissionUsed'])
    expect((await steps.byPhone(client, id, (await steps.admit(id, client)).admission, { badge: '103', pin })).status).toBe(201)
  })

  it('refuses an admission from another browser or briefing, and a made-up one', async () => {
    const [id, otherId] = [await steps.open(), await steps.open()]
    const { client, admission } = await steps.admit(id)
    const visitor = { visitor: { name: 'X', company: 'Y' } }
    const thief = (await steps.admit(id)).client
    for (const answer of [await steps.byPhone(thief, id, admission, visitor), await steps.byPhone(client, otherId, admission, visitor), await steps.byPhone(client, id, 'guess', visitor), await steps.byPhone(company.visitor(), id, admission, visitor)]) {
      expect([answer.status, answer.body.data.code]).toEqual([422, 'badAdmission'])
    }
    expect((await steps.view(id)).count).toBe(0)
  })

  it('asks who it is: 401 without a session or with a wrong PIN, then 429', async () => {
    const id = await steps.open()
    const { client, admission } = await steps.admit(id)
    expect((await steps.byPhone(client, id, admission)).status).toBe(401)
    expect((await steps.byPhone(client, id, admission, { badge: '103' })).body.data.fields).toEqual({ pin: 'is needed' })
    const statuses = []
    for (let index = 0; index < 6; index++) statuses.push((await steps.byPhone(client, id, admission, { badge: '300', pin: '111222' })).status)
    expect(statuses).toEqual([401, 401, 401, 401, 401, 429])
    expect((await steps.view(id)).count).toBe(0)
  })

  it('explains a wrong answer to the check question at once, and keeps it as explained again', async () => {
    const id = await steps.open()
    const { client, admission } = await steps.admit(id, await company.as('hand-a'))
    const wrong = await steps.byPhone(client, id, admission, { answer: 'a' })
    expect(wrong.body.check).toMatchObject({ isRight: false, right: 'b' })
    expect(wrong.body.check?.explain.es).toBeTruthy()
    const other = await steps.admit(id, await company.as('hand-b'))
    expect((await steps.byPhone(other.client, id, other.admission, { answer: 'z' })).body.data.fields).toEqual({ answer: 'is none of the options' })
    expect(await company.db('signIns').where({ briefingId: id }).first('explainedBy')).toEqual({ explainedBy: 'foreman' })
  })

  it('works after closing, marked late', async () => {
    const id = await steps.open()
    await foreman.post(`/api/briefings/${id}/closing`, {})
    const { client, admission } = await steps.admit(id, await company.as('hand-a'))
    expect((await steps.byPhone(client, id, admission)).body).toMatchObject({ late: true })
  })
})

describe('signing in by who runs it', () => {
  it('adds people by hand with a reason, on the foreman\'s device, from paper, and visitors', async () => {
    const id = await steps.open()
    await company.db('briefings').where({ id }).update({ openedAt: '2026-12-01T13:00:00.000Z' })
    const added = await steps.sign(foreman, id, { method: 'addedByForeman', personId: 'hand-b', reason: 'cannotRead', mark: { kind: 'witnessed', by: 'Odd Nilsen' } })
    expect(added.body).toMatchObject({ personId: 'hand-b', reason: 'cannotRead', mark: 'witnessed', language: 'es' })
    expect((await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a', mark: { kind: 'drawn', strokes: [[[0, 0], [0.5, 1]]] } })).status).toBe(201)
    expect((await steps.sign(foreman, id, { method: 'paper', personId: 'hand-c', signedAt: '2026-12-01T13:10:00Z' })).body).toMatchObject({ signedAt: '2026-12-01T13:10:00.000Z', late: false })
    expect((await steps.sign(foreman, id, { method: 'foremanDevice', visitor: { name: 'Ada', company: 'Redpump' } })).status).toBe(201)
    expect((await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'other-hand' })).status).toBe(201)
    expect((await steps.view(id)).count).toBe(5)
  })

  it.each([
    [422, { method: 'addedByForeman', personId: 'hand-a' }, 'reason'],
    [422, { method: 'addedByForeman', personId: 'hand-a', reason: 'cannotRead' }, 'mark'],
    [422, { method: 'foremanDevice' }, 'personId'],
    [422, { method: 'foremanDevice', personId: 'hand-a', visitor: { name: 'A', company: 'B' } }, 'personId'],
    [422, { method: 'foremanDevice', personId: 'nobody' }, 'personId'],
    [422, { method: 'foremanDevice', personId: 'gone' }, 'personId'],
    [422, { method: 'foremanDevice', personId: 'hand-a', signedAt: '2026-12-01T13:29:00Z' }, 'signedAt'],
    [422, { method: 'paper', personId: 'hand-a', signedAt: '2026-12-01T13:29:00Z' }, 'signedAt'],
    [422, { method: 'paper', personId: 'hand-a', signedAt: '2026-12-01T18:00:00Z' }, 'signedAt'],
    [400, { method: 'foremanDevice', personId: 'hand-a', reason: 'lazy' }, 'reason'],
    [400, { method: 'foremanDevice', personId: 'hand-a', key: 'short' }, 'key'],
    [400, { method: 'foremanDevice', personId: 'hand-a', mark: { kind: 'stamp' } }, 'mark.kind'],
    [400, { method: 'foremanDevice', personId: 'hand-a', mark: { kind: 'drawn', strokes: [[[0, 2]]] } }, 'mark.strokes.0.0.1'],
    [400, { method: 'foremanDevice', personId: 'hand-a', admission: 'x' }, 'admission'],
    [400, { method: 'siteTablet', personId: 'hand-a' }, 'method'],
  ])('answers %i to %j, naming the field, and writes nothing', async (status, body, field) => {
    const id = await steps.open()
    const answer = await steps.sign(foreman, id, body)
    expect(answer.status).toBe(status)
    expect(Object.keys(answer.body.data.fields ?? {})).toContain(field)
    expect((await steps.view(id)).count).toBe(0)
  })

  it('is for nobody else', async () => {
    const id = await steps.open()
    const body = { method: 'foremanDevice', personId: 'hand-a' }
    for (const [who, status] of [['hand-a', 404], ['other-foreman', 404], ['office', 403]] as const) expect([who, (await steps.sign(await company.as(who), id, body)).status]).toEqual([who, status])
    expect((await steps.sign(company.visitor(), id, body)).status).toBe(401)
  })

  it('takes a key for one briefing only', async () => {
    const [id, otherId, key] = [await steps.open(), await steps.open(), randomUUID()]
    await steps.sign(foreman, id, { key, method: 'foremanDevice', personId: 'hand-a' })
    const other = await steps.sign(foreman, otherId, { key, method: 'foremanDevice', personId: 'hand-a' })
    expect([other.status, other.body.data.code]).toEqual([409, 'keyTaken'])
  })

  it('can be undone until the seal, with a trace, and the person may sign again', async () => {
    const id = await steps.open()
    const key = randomUUID()
    const { body: { id: line } } = await steps.sign(foreman, id, { key, method: 'foremanDevice', personId: 'hand-a' })
    expect((await (await company.as('other-foreman')).delete(`/api/briefings/${id}/sign-ins/${line}`)).status).toBe(404)
    expect((await foreman.delete(`/api/briefings/${id}/sign-ins/${line}`)).status).toBe(204)
    expect((await foreman.delete(`/api/briefings/${id}/sign-ins/${line}`)).status).toBe(404)
    expect((await steps.view(id)).count).toBe(0)
    expect(await company.db('signIns').where({ id: line }).first('removedBy')).toEqual({ removedBy: 'foreman' })
    expect((await steps.sign(foreman, id, { key, method: 'foremanDevice', personId: 'hand-a' })).body.data.code).toBe('undone')
    expect((await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a' })).status).toBe(201)
  })
})

describe('after the seal', () => {
  async function sealed(): Promise<string> {
    const id = await steps.open()
    await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a' })
    await steps.seal(id)
    return id
  }

  it('nobody signs in any more, nor is undone', async () => {
    const before = await steps.open()
    const { client, admission } = await steps.admit(before, await company.as('hand-b'))
    await steps.seal(before)
    const own = await steps.byPhone(client, before, admission)
    expect([own.status, own.body.data.code]).toEqual([409, 'sealed'])
    const id = await sealed()
    expect((await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-b' })).body.data.code).toBe('sealed')
    const [line] = (await steps.view(id)).signIns
    expect((await foreman.delete(`/api/briefings/${id}/sign-ins/${line!.id}`)).status).toBe(409)
    expect((await foreman.get(`/api/briefings/${id}/presence`)).status).toBe(409)
  })

  it('what was taken without signal before it becomes an addendum; what was taken after it does not', async () => {
    const id = await sealed()
    const { sealedAt, openedAt } = await steps.view(id)
    const kept = await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-b', withoutSignal: true, signedAt: openedAt })
    expect(kept.status).toBe(201)
    expect(kept.body.addendumId).toMatch(/^[0-9a-f]{64}$/)
    const after = await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-c', withoutSignal: true, signedAt: new Date(Date.parse(sealedAt!) + 1).toISOString() })
    expect(after.status).toBe(409)
    expect((await foreman.get(`/api/checks/sheets/${kept.body.addendumId}`)).body).toMatchObject({ intact: true, count: 1, kind: 'addendum' })
  })

  it('somebody who was expected makes it up for themselves with the question answered', async () => {
    const id = await sealed()
    const hand = await company.as('hand-b')
    const without = await steps.sign(hand, id, { method: 'makeUp' })
    expect([without.status, without.body.data.code]).toEqual([422, 'answerNeeded'])
    const made = await steps.sign(hand, id, { method: 'makeUp', answer: 'a' })
    expect(made.status).toBe(201)
    expect(made.body).toMatchObject({ personId: 'hand-b', method: 'makeUp', late: false, check: { isRight: false, right: 'b' } })
    expect(made.body.addendumId).toMatch(/^[0-9a-f]{64}$/)
    expect((await steps.sign(hand, id, { method: 'makeUp', answer: 'b' })).status).toBe(200)
    expect((await steps.sign(await company.as('other-hand'), id, { method: 'makeUp', answer: 'b' })).status).toBe(404)
    expect((await steps.sign(company.visitor(), id, { method: 'makeUp', answer: 'b' })).status).toBe(401)
    expect((await steps.sign(hand, await steps.open(), { method: 'makeUp', answer: 'b' })).body.data.code).toBe('notSealed')
  })
})

describe('a company that asks for signatures', () => {
  it('refuses a tap and takes a typed name', async () => {
    await company.db('company').update({ markAsked: 'signature' })
    try {
      const id = await steps.open()
      const refused = await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a' })
      expect([refused.status, refused.body.data.code]).toEqual([422, 'signatureNeeded'])
      expect((await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a', mark: { kind: 'typed', text: 'W. Abbott' } })).status).toBe(201)
    }
    finally {
      await company.db('company').update({ markAsked: 'tap' })
    }
  })
})

describe('the live stream', () => {
  async function watch(id: string) {
    const watcher = await company.as('foreman')
    const cookie = [...watcher.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
    const stop = new AbortController()
    const stream = await fetch(`${company.server.origin}/api/briefings/${id}/events`, { headers: { cookie }, signal: stop.signal })
    const heard = { text: '' }
    const done = (async () => {
      const reader = stream.body!.pipeThrough(new TextDecoderStream()).getReader()
      for (let part = await reader.read(); !part.done; part = await reader.read()) heard.text += part.value
    })().catch(() => undefined)
    return { watcher, stream, heard, done, stop }
  }

  it('tells of sign-ins, closing and sealing', async () => {
    const id = await steps.open()
    const { stream, heard, done, stop } = await watch(id)
    expect(stream.headers.get('content-type')).toContain('text/event-stream')
    await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a' })
    await steps.seal(id)
    await expect.poll(() => heard.text.match(/event: (signIn|closed|sealed)/g)).toEqual(['event: signIn', 'event: closed', 'event: sealed'])
    expect(heard.text).toContain('Wren Abbott')
    stop.abort()
    await done
  })

  it('ends at the next event once the session is over, and tells nothing of it', async () => {
    const id = await steps.open()
    const { watcher, heard, done } = await watch(id)
    await watcher.delete('/api/session')
    await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a' })
    await done
    expect(heard.text).not.toContain('Wren Abbott')
  })

  it('does not keep a server from stopping', async () => {
    const other = await startSmallCompany()
    const lead = await other.as('foreman')
    const { body: { id } } = await lead.post<{ id: string }>('/api/briefings', { siteId: 'site-a', talk: 'hose-whip', work: [] })
    const cookie = [...lead.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
    await fetch(`${other.server.origin}/api/briefings/${id}/events`, { headers: { cookie } })
    const before = performance.now()
    await other.stop()
    expect(performance.now() - before).toBeLessThan(5000)
  })

  it('is not for hands or other sites', async () => {
    const id = await steps.open()
    expect((await (await company.as('hand-a')).get(`/api/briefings/${id}/events`)).status).toBe(403)
    expect((await (await company.as('other-foreman')).get(`/api/briefings/${id}/events`)).status).toBe(404)
  })
})
