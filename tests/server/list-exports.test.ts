import { parse } from 'csv-parse/sync'
import ICAL from 'ical.js'
import { readSheet } from 'read-excel-file/node'
import { beforeAll, describe, expect, it } from 'vitest'
import { signedIn, type Client } from '../support/client'
import { pagesOf } from '../support/read-pdf'

interface Total { total: number }
interface Items { items: unknown[] }
let safety: Client
let office: Client
let site: string
let renewal: string
beforeAll(async () => {
  [safety, office] = [await signedIn('safety'), await signedIn('office')]
  site = (await safety.get<{ items: { id: string }[] }>('/api/sites')).body.items[0]!.id
  const person = (await office.post<{ id: string }>('/api/people', { name: '=HYPERLINK("http://x.example")', badge: `F${Date.now()}` })).body.id
  renewal = (await safety.post<{ id: string }>('/api/renewals', { type: 'heat-illness', siteId: site, place: 'Yard', trainer: 'Iris Lang', date: '2026-12-20', time: '06:30', minutes: 90, seats: 4, personIds: [person] })).body.id
  await safety.post('/api/packets', { siteId: site, endsOn: '2026-12-20', parts: ['duties'], sendTo: 'gc@outside.example' })
  await office.post('/api/near-misses', { siteId: site, kind: 'fall', what: '@SUM(1)\nsecond line', when: '2026-12-01T13:00:00Z' })
})

const bytesOf = async (client: Client, path: string) => {
  const answer = await fetch(client.origin + path, { headers: { cookie: [...client.cookies].map(pair => pair.join('=')).join('; ') } })
  return { status: answer.status, type: answer.headers.get('content-type') ?? '', name: answer.headers.get('content-disposition') ?? '', bytes: Buffer.from(await answer.arrayBuffer()) }
}
const rowsOf = (bytes: Buffer): string[][] => parse(bytes, { bom: true, relax_column_count: false })

/** Each list, who may take it along, and how many lines it should have. */
const lists: [string, 'safety' | 'office', string, () => Promise<number>][] = [
  ['people', 'office', 'employed=true', async () => (await office.get<Total>('/api/people?employed=true')).body.total],
  ['people', 'office', 'role=foreman', async () => (await office.get<Total>('/api/people?role=foreman')).body.total],
  ['crews', 'safety', '', async () => (await safety.get<Total>('/api/crews')).body.total],
  ['sites', 'safety', '', async () => (await safety.get<Total>('/api/sites')).body.total],
  ['briefings', 'safety', 'from=2026-11-01', async () => (await safety.get<Total>('/api/briefings?from=2026-11-01')).body.total],
  ['near-misses', 'safety', '', async () => (await safety.get<Items>('/api/near-misses')).body.items.length],
  ['clearance', 'safety', 'duty=stacker', async () => (await safety.get<{ people: unknown[] }>(`/api/clearance?duty=stacker`)).body.people.length],
  ['look-ahead', 'safety', 'weeks=26', async () => (await safety.get<{ events: unknown[] }>('/api/look-ahead?weeks=26')).body.events.length],
  ['audit', 'safety', 'to=2026-11-30', async () => (await safety.get<Total>('/api/audit?to=2026-11-30')).body.total],
  ['mail', 'office', '', async () => (await office.get<Total>('/api/mail')).body.total],
  ['talks', 'safety', '', async () => (await safety.get<Items>('/api/talks')).body.items.length],
  ['rules', 'safety', '', async () => (await safety.get<Total>('/api/rules')).body.total],
  ['designations', 'safety', 'kind=assessor', async () => (await safety.get<Total>('/api/designations?kind=assessor')).body.total],
  ['packets', 'safety', '', async () => (await safety.get<Total>('/api/packets')).body.total],
]

describe('every list as a file', () => {
  it.each(lists)('%s for %s ?%s: CSV, XLSX and PDF hold what the list holds', async (list, who, query, count) => {
    const client = who === 'safety' ? safety : office
    const path = (format: string) => `/api/${list}/export?format=${format}${query && `&${query}`}`
    const expected = await count()
    expect(expected).toBeGreaterThan(0)
    const csv = await bytesOf(client, path('csv'))
    expect([csv.status, csv.type]).toEqual([200, 'text/csv; charset=utf-8'])
    expect(csv.name).toMatch(/^attachment; filename="[a-z-]+-\d{4}-\d\d-\d\d\.csv"$/)
    const [header, ...rows] = rowsOf(csv.bytes)
    expect(rows).toHaveLength(expected)
    expect(rows.flat().filter(cell => /^[=+\-@|%\t]/.test(cell))).toEqual([])
    const sheet = await readSheet((await bytesOf(client, path('xlsx'))).bytes)
    expect(sheet).toHaveLength(expected + 1)
    expect(sheet[0]).toEqual(header)
    const paper = await pagesOf(new Uint8Array((await bytesOf(client, path('pdf'))).bytes))
    expect(paper[0]).toContain(`${expected} in all`)
    expect(paper.at(-1)).toContain(`Page ${paper.length} of ${paper.length}`)
  })

  it('keeps a name that looks like a formula as text', async () => {
    const csv = rowsOf((await bytesOf(office, '/api/people/export?format=csv&q=HYPERLINK')).bytes)
    expect(csv[1]![0]).toBe('\'=HYPERLINK("http://x.example")')
    const reports = (await bytesOf(safety, '/api/near-misses/export?format=csv')).bytes.toString('utf8')
    expect(reports).toContain('"\'@SUM(1)\nsecond line"')
  })

  it.each([['renewals', () => `renewal-${renewal}@pourwright`], ['look-ahead', () => 'credential-'], ['briefings', () => 'briefing-']])('%s is a calendar too', async (list, id) => {
    const ics = (await bytesOf(safety, `/api/${list}/export?format=ics`)).bytes.toString('utf8')
    const events = new ICAL.Component(ICAL.parse(ics)).getAllSubcomponents('vevent').map(event => new ICAL.Event(event))
    expect(events.length).toBeGreaterThan(0)
    expect(events.some(event => event.uid.includes(id()))).toBe(true)
  })

  it('offers no calendar of a list without days, takes no unknown filter, and is refused to a hand and a foreman', async () => {
    expect((await office.get('/api/people/export?format=ics')).status).toBe(400)
    expect((await office.get('/api/people/export?format=csv&page=2')).status).toBe(400)
    for (const who of ['installer', 'foreman'] as const) {
      const client = await signedIn(who)
      for (const list of ['people', 'crews', 'sites', 'briefings', 'near-misses', 'clearance', 'look-ahead', 'audit', 'mail', 'renewals', 'rules', 'designations']) expect((await client.get(`/api/${list}/export?format=csv`)).status).toBe(403)
    }
  })

  it('speaks the reader\'s language', async () => {
    await office.patch('/api/session', { language: 'es' })
    const csv = await bytesOf(office, '/api/people/export?format=csv&role=foreman')
    await office.patch('/api/session', { language: 'en' })
    expect(csv.name).toContain('personas-')
    expect(rowsOf(csv.bytes)[1]![3]).toBe('Mayordomo')
  })
})
