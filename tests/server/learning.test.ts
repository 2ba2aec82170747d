import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { beforeAll, describe, expect, it } from 'vitest'
import { createClient, signedIn, type Client } from '../support/client'
import { readRealBanks } from '../support/teaching'

const banks = readRealBanks()
const output = resolve(import.meta.dirname, '../../.output/public')

let hire: Client
beforeAll(async () => {
  hire = await signedIn('newHire')
})

/** Every text file that the server would send to anybody. */
function publicFiles(folder: string): string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name)
    return statSync(path).isDirectory() ? publicFiles(path) : /\.(js|mjs|json|html|css|txt|map|xml|webmanifest|sql|dump)$/.test(name) ? [path] : []
  })
}

describe('the keys of the quizzes', () => {
  const feedback = banks.flatMap(bank => bank.items.flatMap(item => [item.feedback.en, item.feedback.es]))
  const stems = banks.flatMap(bank => bank.items.flatMap(item => [item.stem.en, item.stem.es]))

  it('are in nothing that the built client holds', () => {
    const files = publicFiles(output)
    expect(files.filter(path => readFileSync(path, 'utf8').includes('Same gap top and bottom: plumb'))).not.toEqual([])
    const leaks = files.filter((path) => {
      const text = readFileSync(path, 'utf8')
      return [...feedback, ...stems].some(words => text.includes(words.slice(0, 40)) || text.includes(JSON.stringify(words).slice(1, 40)))
    })
    expect(leaks).toEqual([])
  })

  it.each([
    '/__nuxt_content/lessonsEn/sql_dump.txt', '/__nuxt_content/lessonsEn/sql_dump', '//__nuxt_content/lessonsEn/sql_dump', '/%5f%5fnuxt_content/lessonsEn/sql_dump',
    '/x/../__nuxt_content/modulesEs/sql_dump', '/__NUXT_CONTENT/lessonsEn/query', '/%5F_nuxt_content/lessonsEn/query', '/_nuxt/../__nuxt_content/lessonsEn/sql_dump.txt',
    '/assets/quizzes/stacking.yaml', '/quizzes/stacking.yaml', '/server/assets/quizzes/stacking.yaml', '/api/modules/stacking/../../../server/assets/quizzes/stacking.yaml', '/_nuxt/quizzes/stacking.yaml',
  ])('are not to be had at %s', async (path) => {
    const answer = await hire.get(path)
    expect(answer.status).not.toBe(500)
    expect(feedback.filter(words => answer.text.includes(words.slice(0, 40)))).toEqual([])
    expect(answer.text).not.toMatch(/mustKnow|"key"|key:/)
    expect(answer.text).not.toContain('CREATE TABLE')
  })

  it('are not in an attempt, its page or its module before it is graded', async () => {
    const { status, body, text } = await hire.post<{ id: string, items: { id: string }[] }>('/api/modules/running-bond/attempts')
    expect(status).toBe(201)
    const again = await hire.get(`/api/attempts/${body.id}`)
    const page = await hire.get(`/learn/running-bond/quiz?attempt=${body.id}`)
    const module = await hire.get('/api/modules/running-bond?language=en')
    for (const seen of [text, again.text, page.text, module.text]) {
      expect(feedback.filter(words => seen.includes(words.slice(0, 40)))).toEqual([])
      expect(seen).not.toMatch(/"(key|feedback|mustKnow|tolerance|source)"/)
    }
    expect(page.status).toBe(200)
    expect(body.items).toHaveLength(banks.find(bank => bank.module === 'running-bond')!.quizLength)
  })

  it('stay unnamed for items that were not answered', async () => {
    const { body } = await hire.post<{ id: string }>('/api/modules/running-bond/attempts')
    const graded = await hire.post<{ passed: boolean, score: number }>(`/api/attempts/${body.id}/submission`, { answers: {} })
    expect(graded.body).toMatchObject({ passed: false, score: 0 })
    expect(feedback.filter(words => graded.text.includes(words.slice(0, 40)))).toEqual([])
    expect(graded.text).not.toContain('"right"')
  })
})

describe('learning over the API', () => {
  it('answers a wall in the person\'s language with numbers as numbers', async () => {
    const { body } = await hire.get<{ items: { slug: string, title: string, minutes: number | null, state: string, lessons: { minutes: number }[] }[] }>('/api/modules')
    expect(body.items).toHaveLength(16)
    const stacking = body.items.find(item => item.slug === 'stacking')!
    expect(stacking.title).toBe('Apilar bloques')
    expect(stacking.minutes).toBe(stacking.lessons.reduce((sum, lesson) => sum + lesson.minutes, 0))
    expect(stacking.minutes).toBeGreaterThan(5)
  })

  it('answers a lesson with its parsed text and its neighbours', async () => {
    const { body } = await hire.get('/api/modules/stacking/lessons/level-and-plumb?language=en')
    expect(body).toMatchObject({ number: 2, total: 4, language: 'en', previous: { slug: 'seat-every-block' }, next: { slug: 'seams-and-weak-spots' } })
    expect(JSON.stringify(body.body)).toContain('lesson-drawing')
  })

  it('records that a lesson was read', async () => {
    expect((await hire.put('/api/modules/stacking/lessons/stop-height/read')).status).toBe(204)
    const { body } = await hire.get<{ lessons: { slug: string, read: boolean }[] }>('/api/modules/stacking')
    expect(body.lessons.find(lesson => lesson.slug === 'stop-height')?.read).toBe(true)
  })

  it.each([
    ['GET', '/api/modules/welding', undefined, 404],
    ['GET', '/api/modules/Not%20a%20slug', undefined, 400],
    ['GET', '/api/modules/stacking?language=fr', undefined, 400],
    ['GET', '/api/modules/stacking?lang=es', undefined, 400],
    ['GET', '/api/modules/stacking/lessons/nothing', undefined, 404],
    ['PUT', '/api/modules/steel/lessons/nothing/read', undefined, 404],
    ['POST', '/api/modules/pour-lead/attempts', undefined, 409],
    ['POST', '/api/modules/welding/attempts', undefined, 404],
    ['GET', '/api/attempts/nothing', undefined, 404],
    ['POST', '/api/attempts/nothing/submission', { answers: {} }, 404],
    ['POST', '/api/attempts/nothing/submission', {}, 400],
    ['POST', '/api/attempts/nothing/submission', { answers: [] }, 400],
    ['POST', '/api/attempts/nothing/submission', { answers: { a: null } }, 400],
    ['POST', '/api/attempts/nothing/submission', { answers: {}, passed: true }, 400],
    ['POST', '/api/attempts/nothing/submission', undefined, 400],
    ['POST', '/api/sign-off-requests', { module: 'pour-lead' }, 409],
    ['POST', '/api/sign-off-requests', { module: 'welding' }, 404],
    ['POST', '/api/sign-off-requests', { module: 7 }, 400],
    ['GET', '/api/sign-off-requests', undefined, 403],
    ['POST', '/api/sign-offs', { personId: 'x', module: 'stacking', steps: [], mark: { kind: 'tap' } }, 403],
  ] as const)('answers %s %s with %j by %i', async (method, path, body, status) => {
    const answer = method === 'GET' ? await hire.get(path) : method === 'PUT' ? await hire.put(path, body) : await hire.post(path, body)
    expect(answer.status).toBe(status)
    expect(answer.body).toMatchObject({ data: { code: expect.any(String) } })
  })

  it.each([
    [{ personId: 'x', module: 'stacking', steps: [], mark: { kind: 'tap' } }, 404],
    [{ personId: 'x', module: 'stacking', steps: 'all', mark: { kind: 'tap' } }, 400],
    [{ personId: 'x', module: 'stacking', steps: [], mark: { kind: 'stamp' } }, 400],
    [{ personId: 'x', module: 'stacking', steps: [{ id: 'a', ok: 'yes' }], mark: { kind: 'tap' } }, 400],
    [{ module: 'stacking', steps: [], mark: { kind: 'tap' } }, 400],
  ])('answers the foreman\'s sign-off %j by %i', async (body, status) => {
    const lead = await signedIn('foreman')
    expect((await lead.post('/api/sign-offs', body)).status).toBe(status)
  })

  it('knows no attempt of another person', async () => {
    const { body } = await hire.post<{ id: string }>('/api/modules/stacking/attempts')
    const installer = await signedIn('installer')
    expect((await installer.get(`/api/attempts/${body.id}`)).status).toBe(404)
    expect((await installer.post(`/api/attempts/${body.id}/submission`, { answers: {} })).status).toBe(404)
    expect((await hire.get(`/api/attempts/${body.id}`)).body).toMatchObject({ submittedAt: null })
  })

  it('tells the safety manager, and nobody else, how the items did', async () => {
    const safety = await signedIn('safety')
    const { status, body } = await safety.get<{ people: number, items: { served: number, p: number }[] }>('/api/item-review?module=running-bond')
    expect(status).toBe(200)
    expect(body.items).toHaveLength(banks.find(bank => bank.module === 'running-bond')!.items.length)
    expect(body.people).toBeGreaterThan(0)
    expect((await safety.get('/api/item-review')).status).toBe(400)
    expect((await safety.get('/api/item-review?module=welding')).status).toBe(404)
    expect((await hire.get('/api/item-review?module=running-bond')).status).toBe(403)
  })

  it('asks for a session everywhere', async () => {
    const stranger = createClient()
    for (const path of ['/api/modules', '/api/modules/stacking', '/api/modules/stacking/lessons/stop-height', '/api/attempts/x', '/api/sign-off-requests']) expect((await stranger.get(path)).status).toBe(401)
  })
})

describe('the talk library', () => {
  it('gives minutes as numbers, tags, and the question without its answer', async () => {
    const foreman = await signedIn('foreman')
    const { items } = (await foreman.get<{ items: { slug: string, minutes: unknown, tags: string[], check: Record<string, unknown> }[] }>('/api/talks?language=es')).body
    expect(items.length).toBeGreaterThanOrEqual(48)
    expect(items.filter(item => typeof item.minutes !== 'number' || item.tags.length === 0 || 'right' in item.check || 'explain' in item.check)).toEqual([])
  })
})
