import ICAL from 'ical.js'
import sharp from 'sharp'
import { beforeAll, describe, expect, test } from 'vitest'
import { createClient, signedIn, type Client } from '../support/client'

interface Item { id: string, personId: string, state: string, expiresOn: string | null, type: string }
interface List { items: Item[], total: number, page: number, perPage: number }
interface Problem { data: { code: string, fields?: Record<string, string> } }

let safety: Client
let hand: Client
let foreman: Client
let office: Client
let handId: string

beforeAll(async () => {
  [safety, hand, foreman, office] = await Promise.all([signedIn('safety'), signedIn('installer'), signedIn('foreman'), signedIn('office')])
  handId = ((await hand.get<{ person: { id: string } }>('/api/session')).body).person.id
})

const formOf = (bytes: Uint8Array | string, name = 'card.jpg', field = 'file') => {
  const form = new FormData()
  form.append(field, new Blob([typeof bytes === 'string' ? bytes : new Uint8Array(bytes)]), name)
  return form
}
const photo = () => sharp({ create: { width: 64, height: 48, channels: 3, background: '#888' } }).withExif({ IFD3: { GPSLatitude: '39/1 45/1 0/1' }, IFD0: { Make: 'SecretCam' } }).jpeg().toBuffer()
const pdf = '%PDF-1.4\n1 0 obj<</Type/Catalog>>endobj\ntrailer<</Root 1 0 R>>\n%%EOF\n'

describe('files', () => {
  test('a picture comes back without its place and camera, for who may see it and nobody else', async () => {
    const sent = await photo()
    expect(sent.includes('SecretCam')).toBe(true)
    const made = await hand.post<{ id: string, type: string, size: number }>('/api/files', formOf(sent))
    expect([made.status, made.body.type]).toEqual([201, 'image/jpeg'])
    const answer = await fetch(`${hand.origin}/api/files/${made.body.id}`, { headers: { cookie: [...hand.cookies].map(([name, value]) => `${name}=${value}`).join('; ') } })
    const back = Buffer.from(await answer.arrayBuffer())
    expect((await sharp(back).metadata()).exif).toBeUndefined()
    expect(back.includes('SecretCam')).toBe(false)
    expect(answer.headers.get('content-type')).toBe('image/jpeg')
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff')
    expect(answer.headers.get('content-security-policy')).toContain('sandbox')
    expect(answer.headers.get('cache-control')).toContain('no-store')
    expect((await safety.get(`/api/files/${made.body.id}`)).status).toBe(200)
    expect((await office.get(`/api/files/${made.body.id}`)).status).toBe(404)
    expect((await createClient().get(`/api/files/${made.body.id}`)).status).toBe(401)
  })

  test('a foreman sees the photo once it belongs to a card of the crew', async () => {
    const file = (await hand.post<{ id: string }>('/api/files', formOf(pdf, 'card.pdf'))).body.id
    expect((await foreman.get(`/api/files/${file}`)).status).toBe(404)
    const added = await hand.post('/api/credentials', { personId: handId, type: 'aerial-lift', issuedOn: '2026-11-02', fileId: file })
    expect(added.status).toBe(201)
    expect((await foreman.get(`/api/files/${file}`)).status).toBe(200)
  })

  test.each<[string, () => BodyInit | FormData, number, string]>([
    ['a program called card.jpg', () => formOf('#!/bin/sh\necho'), 415, 'wrongFileType'],
    ['a page called card.pdf', () => formOf('<html><script>1</script>', 'card.pdf'), 415, 'wrongFileType'],
    ['half a picture', () => formOf(Uint8Array.from([0xFF, 0xD8, 0xFF, 0xE0, 0, 16, 0x4A, 0x46, 0x49, 0x46, 0])), 415, 'brokenPicture'],
    ['a PDF that stops early', () => formOf('%PDF-1.4\n1 0 obj', 'card.pdf'), 415, 'brokenPdf'],
    ['a PDF that runs scripts', () => formOf(pdf.replace('/Catalog', '/Catalog/OpenAction<</S/JavaScript>>'), 'card.pdf'), 415, 'activePdf'],
    ['a HEIC photo', () => formOf(Uint8Array.from([0, 0, 0, 24, ...Buffer.from('ftypheic'), 0, 0, 0, 0, ...Buffer.from('mif1heic')])), 415, 'heic'],
    ['more than 10 MB', () => formOf(new Uint8Array(10 * 1024 * 1024 + 1)), 413, 'tooLarge'],
    ['another field', () => formOf(pdf, 'card.pdf', 'photo'), 400, 'invalid'],
    ['no content', () => formOf(''), 400, 'invalid'],
    ['an empty form', () => new FormData(), 400, 'invalid'],
  ])('refuses %s', async (_what, bodyOf, status, code) => {
    const answer = await hand.post<Problem>('/api/files', bodyOf())
    expect([answer.status, answer.body.data.code]).toEqual([status, code])
  })

  test('refuses a body that is no form, and one without its boundary', async () => {
    expect((await hand.post('/api/files', { file: 'x' })).status).toBe(415)
    const answer = await fetch(`${hand.origin}/api/files`, { method: 'POST', body: 'x', headers: { 'origin': hand.origin, 'content-type': 'multipart/form-data', 'cookie': [...hand.cookies].map(([name, value]) => `${name}=${value}`).join('; ') } })
    expect(answer.status).toBe(400)
  })
})

describe('the list over the API', () => {
  test('the default page has 50, `within` agrees with its count by day, and pages do not overlap', async () => {
    const all = (await safety.get<List>('/api/credentials')).body
    expect([all.page, all.perPage, all.items.length]).toEqual([1, 50, 50])
    const second = (await safety.get<List>('/api/credentials?page=2')).body
    expect(second.items.some(item => all.items.some(first => first.id === item.id))).toBe(false)
    const due = (await safety.get<List>('/api/credentials?within=60&perPage=200')).body
    expect(due.items.every(item => item.expiresOn! >= '2026-12-01' && item.expiresOn! <= '2027-01-30')).toBe(true)
    expect((await safety.get<{ total: number }>('/api/credentials/expiry-days?within=60')).body.total).toBe(due.total)
  })

  test.each(['within=-1', 'within=x', 'state=green', 'perPage=201', 'page=0', 'sort=colour', 'includeExpired=yes', 'who=me', 'state=expired&state=inDate'])('refuses ?%s with 400 and its field', async (query) => {
    const answer = await safety.get<Problem>(`/api/credentials?${query}`)
    expect([answer.status, answer.body.data.code]).toEqual([400, 'invalid'])
    expect(Object.keys(answer.body.data.fields!)).toEqual([query.split('=')[0]])
  })

  test('a hand sees only their own, and exports, verifying and reminders are not theirs', async () => {
    const own = (await hand.get<List>('/api/credentials?perPage=200')).body
    expect(new Set(own.items.map(item => item.personId))).toEqual(new Set([handId]))
    for (const client of [hand, foreman, office]) {
      expect((await client.get('/api/credentials/export?format=csv')).status).toBe(403)
      expect((await client.post(`/api/credentials/${own.items[0]!.id}/verification`, { accept: true })).status).toBe(403)
      expect((await client.post(`/api/credentials/${own.items[0]!.id}/withdrawal`, { reason: 'x' })).status).toBe(403)
      expect((await client.post('/api/reminders', { credentialIds: [own.items[0]!.id] })).status).toBe(403)
    }
    expect((await safety.post('/api/imports/people?dryRun=true', formOf('badge\n1'))).status).toBe(403)
  })
})

describe('exports over the API', () => {
  test.each([['csv', 'text/csv'], ['xlsx', 'application/vnd.openxmlformats'], ['pdf', 'application/pdf'], ['ics', 'text/calendar']])('%s comes as a file with the list\'s filters', async (format, type) => {
    const answer = await safety.get(`/api/credentials/export?format=${format}&within=60&includeExpired=true`)
    expect(answer.status).toBe(200)
    expect(answer.headers.get('content-type')).toContain(type)
    expect(answer.headers.get('content-disposition')).toBe(`attachment; filename="credentials-2026-12-01.${format}"`)
    expect(answer.text.length).toBeGreaterThan(500)
  })

  test('the feed is read without a session until it is ended', async () => {
    const { url } = (await safety.post<{ url: string }>('/api/calendar', { filters: { within: '60' } })).body
    const feed = await createClient().get(new URL(url).pathname)
    const { total } = (await safety.get<List>('/api/credentials?within=60')).body
    expect(new ICAL.Component(ICAL.parse(feed.text)).getAllSubcomponents('vevent')).toHaveLength(total)
    expect((await safety.delete('/api/calendar')).status).toBe(204)
    expect((await createClient().get(new URL(url).pathname)).status).toBe(404)
  })
})

test('a card goes from photo to check page: added, verified, carried, withdrawn', async () => {
  const added = await hand.post<Item>('/api/credentials', { personId: handId, type: 'first-aid-cpr', issuedOn: '2026-11-01', expiresOn: '2028-11-01', issuer: 'County\nclass' })
  expect([added.status, added.body.state]).toEqual([201, 'unverified'])
  const { id } = added.body
  expect((await hand.get<Problem>(`/api/credentials/${id}/card.pdf`)).body.data.code).toBe('notCounting')
  const verified = await safety.post<Item & { cardCode: string }>(`/api/credentials/${id}/verification`, { accept: true })
  expect([verified.status, verified.body.state]).toEqual([200, 'inDate'])
  const card = await hand.get(`/api/credentials/${id}/card.pdf`)
  expect([card.status, card.headers.get('content-type')]).toEqual([200, 'application/pdf'])
  expect((await hand.get(`/api/credentials/${id}/card.jwt`)).text.split('.')).toHaveLength(3)
  const check = () => createClient().get(`/api/checks/cards/${verified.body.cardCode}`)
  expect((await check()).body).toEqual({ valid: true, type: 'first-aid-cpr', initials: expect.stringMatching(/^\p{Lu}{1,2}$/u), checkedOn: '2026-12-01' })
  expect((await safety.post(`/api/credentials/${id}/withdrawal`, { reason: 'Wrong person' })).status).toBe(200)
  expect((await check()).body).toMatchObject({ valid: false })
  expect((await safety.post<Problem>(`/api/credentials/${id}/withdrawal`, { reason: 'again' })).status).toBe(409)
  expect((await createClient().get('/api/checks/cards/NOSUCHCODE')).status).toBe(404)
})

test('adding answers 422 with the rule that it breaks, 400 for what is malformed, 404 for somebody else', async () => {
  const base = { personId: handId, type: 'ladders', issuedOn: '2026-11-01' }
  const answers = await Promise.all([
    { ...base, type: 'stacking' }, { ...base, type: 'first-aid-cpr' }, { ...base, expiresOn: '2027-01-01' }, { ...base, type: 'site-orientation' },
    { ...base, issuedOn: 'today' }, { ...base, extra: 1 }, [], 'x', { ...base, personId: 'someone-else' },
  ].map(body => hand.post<Problem>('/api/credentials', body)))
  expect(answers.map(answer => `${answer.status} ${answer.body.data.code}`)).toEqual([
    '422 moduleOnly', '422 expiresOnNeeded', '422 expiresOnRefused', '422 siteNeeded', '400 invalid', '400 invalid', '400 invalid', '400 invalid', '404 notFound',
  ])
})
