import { beforeAll, describe, expect, it } from 'vitest'
import { signedIn, type Client } from '../support/client'

interface Review { items: { id: string, stem: string, options: object[] }[], attempts: number }

let safety: Client
beforeAll(async () => {
  safety = await signedIn('safety')
})

describe('the review of questions over the API', () => {
  it('lists the modules with a quiz, in the language asked for', async () => {
    const { body } = await safety.get<{ items: { slug: string, title: string, attempts: number }[] }>('/api/item-review/modules?language=es')
    expect(body.items.find(one => one.slug === 'stacking')).toMatchObject({ title: 'Apilar bloques', attempts: expect.any(Number) })
    expect(body.items.some(one => one.attempts > 0)).toBe(true)
  })

  it('answers stems in the language asked for, and fewer attempts for one language', async () => {
    const all = (await safety.get<Review>('/api/item-review?module=stacking')).body
    const spanish = (await safety.get<Review>('/api/item-review?module=stacking&takenIn=es&language=es')).body
    expect(spanish.attempts).toBeLessThan(all.attempts)
    expect(spanish.items[0]!.stem).not.toBe(all.items[0]!.stem)
    expect(spanish.items.map(item => item.id)).toEqual(all.items.map(item => item.id))
  })

  it('answers a file in both formats', async () => {
    const csv = await safety.get('/api/item-review/export?module=stacking&format=csv')
    expect([csv.status, csv.headers.get('content-type'), csv.headers.get('content-disposition')]).toEqual([200, 'text/csv; charset=utf-8', 'attachment; filename="question-review-stacking-2026-12-01.csv"'])
    expect(csv.text).toContain('stacking-01')
    expect((await safety.get('/api/item-review/export?module=stacking&format=xlsx')).status).toBe(200)
  })

  it.each([
    ['GET', '/api/item-review?module=stacking&takenIn=fr', undefined, 400],
    ['GET', '/api/item-review?module=stacking&language=fr', undefined, 400],
    ['GET', '/api/item-review?module=stacking&lang=es', undefined, 400],
    ['GET', '/api/item-review?module=Not%20a%20slug', undefined, 400],
    ['GET', '/api/item-review/export?module=stacking', undefined, 400],
    ['GET', '/api/item-review/export?module=stacking&format=ics', undefined, 400],
    ['GET', '/api/item-review/export?module=welding&format=csv', undefined, 404],
    ['GET', '/api/item-review/no-such-01', undefined, 404],
    ['GET', '/api/item-review/Not%20an%20item', undefined, 400],
    ['GET', '/api/item-review/stacking-01?takenIn=fr', undefined, 400],
    ['POST', '/api/item-review/no-such-01/strike', { reason: 'x' }, 404],
    ['POST', '/api/item-review/stacking-01/strike', {}, 400],
    ['POST', '/api/item-review/stacking-01/strike', { reason: '  ' }, 400],
    ['POST', '/api/item-review/stacking-01/strike', { reason: 'x'.repeat(1001) }, 400],
    ['POST', '/api/item-review/stacking-01/strike', { reason: 7 }, 400],
    ['POST', '/api/item-review/stacking-01/strike', { reason: 'x', force: true }, 400],
    ['POST', '/api/item-review/stacking-01/strike?preview=maybe', { reason: 'x' }, 400],
    ['POST', '/api/item-review/stacking-01/strike', undefined, 400],
    ['POST', '/api/item-review/no-such-01/restore', { reason: 'x' }, 404],
    ['POST', '/api/item-review/stacking-01/restore', { reason: 'x' }, 409],
    ['POST', '/api/item-review/stacking-01/restore', {}, 400],
  ] as const)('answers %s %s with %j by %i', async (method, path, body, status) => {
    const answer = method === 'GET' ? await safety.get(path) : await safety.post(path, body)
    expect(answer.status).toBe(status)
    expect(answer.body).toMatchObject({ data: { code: expect.any(String) } })
  })

  it('previews a strike and saves nothing; then strikes, refuses a second one, and restores', async () => {
    const { items } = (await safety.get<Review>('/api/item-review?module=steel')).body
    const path = `/api/item-review/${items[0]!.id}`
    const preview = await safety.post(`${path}/strike?preview=true`, { reason: 'Unclear' })
    expect([preview.status, preview.body]).toEqual([200, { item: items[0]!.id, isStruck: true, attempts: 0, people: 0, credentials: 0 }])
    expect((await safety.get(path)).body).toMatchObject({ isStruck: false, strikes: [] })
    expect((await safety.post(`${path}/strike`, { reason: 'Unclear' })).status).toBe(200)
    expect((await safety.post(`${path}/strike`, { reason: 'Unclear' })).body).toMatchObject({ statusCode: 409, data: { code: 'alreadyStruck' } })
    expect((await safety.post(`${path}/restore`, { reason: 'Mended' })).body).toMatchObject({ isStruck: false })
    expect((await safety.get(path)).body).toMatchObject({ isStruck: false, strikes: [{ reason: 'Unclear', restored: { reason: 'Mended' } }] })
  })

  it('is the safety manager\'s alone', async () => {
    for (const who of ['foreman', 'super', 'office', 'installer', 'newHire'] as const) {
      const client = await signedIn(who)
      for (const path of ['/api/item-review/modules', '/api/item-review/stacking-01', '/api/item-review/export?module=stacking&format=csv']) expect((await client.get(path)).status).toBe(403)
      expect((await client.post('/api/item-review/stacking-01/strike', { reason: 'x' })).status).toBe(403)
      expect((await client.post('/api/item-review/stacking-01/restore', { reason: 'x' })).status).toBe(403)
    }
  })
})
