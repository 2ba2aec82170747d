import { createHash, createPublicKey, verify } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import canonicalize from 'canonicalize'
import type { SheetCheckView } from '#shared/schemas/briefing'
import type { BriefingSheet, SheetAddendum } from '#shared/domain/sheet'
import { sealLeftOvers } from '~~/server/services/sealing'
import { toSettings } from '~~/server/services/settings'
import { briefingSteps, type Problem } from '../support/briefing-steps'
import type { Client } from '../support/client'
import { decodeQr, pagesOf, rasterise } from '../support/read-pdf'
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

interface SheetJson { sheet: BriefingSheet, previousHash: string | null, hash: string, signature: string, keyId: string, publicKey: JsonWebKey, addenda: { sheet: SheetAddendum, hash: string, previousHash: string, signature: string }[] }
const sheetOf = async (id: string) => (await foreman.get<SheetJson>(`/api/briefings/${id}/sheet.json`)).body
const check = (hash: string) => company.visitor().get<SheetCheckView & Problem>(`/api/checks/sheets/${hash}`)
const rehash = (previousHash: string | null, sheet: unknown) => createHash('sha256').update(canonicalize({ previousHash, sheet })!).digest('hex')

async function fetchPdf(client: Client, path: string): Promise<{ bytes: Uint8Array, type: string | null, name: string | null }> {
  const cookie = [...client.cookies].map(([name, value]) => `${name}=${value}`).join('; ')
  const answer = await fetch(client.origin + path, { headers: { cookie } })
  return { bytes: new Uint8Array(await answer.arrayBuffer()), type: answer.headers.get('content-type'), name: answer.headers.get('content-disposition') }
}

async function sealedBriefing(): Promise<string> {
  const id = await steps.open({ notes: 'Caps on by seven.\nLupe checks the ladder.', weather: { temperatureF: 34, windMph: 12, sky: 'wet' } })
  await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a', mark: { kind: 'drawn', strokes: [[[0.1, 0.2], [0.4, 0.8], [0.9, 0.1]]] } })
  await steps.sign(foreman, id, { method: 'addedByForeman', personId: 'hand-b', reason: 'cannotRead', mark: { kind: 'witnessed', by: 'Odd Nilsen' } })
  await steps.sign(foreman, id, { method: 'foremanDevice', visitor: { name: 'Ada Cole', company: 'Redpump', host: 'Ines' } })
  await steps.seal(id)
  return id
}

describe('sealing', () => {
  it('asks for the closing first, gives the same hash when repeated, and is for who runs it', async () => {
    const id = await steps.open()
    const early = await foreman.post<Problem>(`/api/briefings/${id}/sealing`, {})
    expect([early.status, early.body.data.code]).toEqual([409, 'stillOpen'])
    expect((await foreman.get(`/api/briefings/${id}/sheet.json`)).status).toBe(404)
    const first = await steps.seal(id)
    expect((await foreman.post(`/api/briefings/${id}/sealing`)).body).toEqual(first)
    expect((await (await company.as('office')).post(`/api/briefings/${id}/sealing`, {})).status).toBe(403)
    expect((await (await company.as('other-foreman')).post(`/api/briefings/${id}/sealing`, {})).status).toBe(404)
    expect((await (await company.as('hand-a')).get(`/api/briefings/${id}/sheet.json`)).status).toBe(404)
  })

  it('chains the site\'s sheets by SHA-256 over RFC 8785, each signed with Ed25519', async () => {
    const [first, second] = [await sealedBriefing(), await sealedBriefing()]
    const [one, two] = [await sheetOf(first), await sheetOf(second)]
    expect(two.previousHash).toBe(one.hash)
    for (const { sheet, previousHash, hash, signature, publicKey } of [one, two]) {
      expect(rehash(previousHash, sheet)).toBe(hash)
      expect(verify(null, Buffer.from(canonicalize({ previousHash, sheet })!), createPublicKey({ key: publicKey, format: 'jwk' }), Buffer.from(signature, 'base64url'))).toBe(true)
    }
    const numbers = await company.db('sheets').where({ siteId: 'site-a' }).orderBy('number').select('number', 'previousHash', 'hash')
    expect(numbers[0]).toMatchObject({ number: 1, previousHash: null })
    numbers.slice(1).forEach((row, index) => expect(row.previousHash).toBe(numbers[index]!.hash))
  })

  it('starts a chain of its own at each site', async () => {
    const other = await company.as('other-foreman')
    const { body: { id } } = await other.post<{ id: string }>('/api/briefings', { siteId: 'site-b', talk: 'first-blocks', work: [] })
    await other.post(`/api/briefings/${id}/closing`, {})
    expect((await other.post<{ previousHash: string | null }>(`/api/briefings/${id}/sealing`, {})).body.previousHash).toBeNull()
  })

  it('holds what a sign-in sheet must: subject, speaker, times, each name with employer and mark, who was absent', async () => {
    const { sheet } = await sheetOf(await sealedBriefing())
    expect(sheet).toMatchObject({
      company: 'Slate Hollow Forms', siteCode: 'QUARRY', date: '2026-12-01', speaker: { name: 'Ines Toledo', title: 'foreman', company: 'Slate Hollow Forms', mark: 'Ines Toledo' },
      talk: { slug: 'capped-bars' }, weather: { temperatureF: 34, sky: 'wet' }, sealedBy: 'Ines Toledo', isSealedByDayEnd: false, isClockSet: true,
    })
    expect(sheet.lines.map(line => [line.name, line.employer, line.markKind, line.enteredBy])).toEqual([
      ['Wren Abbott', 'Slate Hollow Forms', 'drawn', 'Ines Toledo'], ['Lupe Ferrer', 'Slate Hollow Forms', 'witnessed', 'Ines Toledo'], ['Ada Cole', 'Redpump', 'tap', 'Ines Toledo'],
    ])
    expect(sheet.absent.map(person => person.name).sort()).toEqual(['Ines Toledo', 'Odd Nilsen'])
  })

  it('mails the hash to every safety manager once, with the link to recheck it', async () => {
    const id = await sealedBriefing()
    const { hash } = await sheetOf(id)
    await foreman.post(`/api/briefings/${id}/sealing`, {})
    const mails = await company.db('mail').where('key', 'like', `sheet:${hash}:%`)
    expect(mails.map(mail => mail.recipient)).toEqual(['safety@slatehollow.example'])
    expect(mails[0].body).toContain(`${company.server.origin}/check/${hash}`)
  })

  it('refuses any later change in the database itself', async () => {
    await sealedBriefing()
    await expect(company.db('sheets').update({ body: '{}' })).rejects.toThrow('append-only')
    await expect(company.db('sheets').delete()).rejects.toThrow('append-only')
  })
})

describe('a briefing that was left open', () => {
  const settingsAt = (clock: string) => toSettings({ databasePath: company.server.databasePath, filesPath: '', signingKeyPath: '', signingKey: '', clock, demo: '', origin: 'https://forms.example', tls: '', smtpUrl: '', mailFrom: '', setupToken: '' })

  it('is sealed at the end of its site\'s day and marked so, and no sooner; a second run seals nothing', async () => {
    const id = await steps.open()
    await steps.sign(foreman, id, { method: 'foremanDevice', personId: 'hand-a' })
    await sealLeftOvers(company.db, settingsAt('2026-12-02T06:59:00Z'))
    expect((await steps.view(id)).state).toBe('open')
    expect(await sealLeftOvers(company.db, settingsAt('2026-12-02T07:00:00Z'))).toBeGreaterThan(0)
    expect(await sealLeftOvers(company.db, settingsAt('2026-12-02T07:01:00Z'))).toBe(0)
    const { sheet, hash } = await sheetOf(id)
    expect(sheet).toMatchObject({ isSealedByDayEnd: true, sealedBy: null, speaker: { mark: null } })
    expect(sheet.closedAt).toBe(sheet.lines.at(-1)!.signedAt)
    expect((await check(hash)).body).toMatchObject({ intact: true, signature: 'valid', count: 1 })
    expect((await company.db('mail').where('key', 'like', `sheet:${hash}:%`).first()).body).toContain('Nobody sealed it')
  })

  it('waits an hour for what a phone kept without signal to arrive whole', async () => {
    const id = await steps.open({ openedAt: '2026-11-30T13:30:00Z', withoutSignal: true })
    const { createdAt } = await company.db('briefings').where({ id }).first('createdAt')
    const after = (minutes: number) => new Date(Date.parse(createdAt) + minutes * 60_000).toISOString()
    await sealLeftOvers(company.db, settingsAt(after(58)))
    expect((await steps.view(id)).state).toBe('open')
    await sealLeftOvers(company.db, settingsAt(after(61)))
    expect((await steps.view(id)).state).toBe('sealed')
  })
})

describe('an addendum', () => {
  it('is a sheet of the same chain that points at the one it corrects', async () => {
    const id = await sealedBriefing()
    const { hash } = await sheetOf(id)
    const added = await foreman.post<{ id: string, previousHash: string }>(`/api/briefings/${id}/addenda`, { text: 'Odd Nilsen was at the other site.' })
    expect([added.status, added.body.previousHash]).toEqual([201, hash])
    const { addenda } = await sheetOf(id)
    expect(addenda[0]!.sheet).toMatchObject({ kind: 'addendum', addsTo: hash, writtenBy: 'Ines Toledo', text: 'Odd Nilsen was at the other site.' })
    expect(rehash(addenda[0]!.previousHash, addenda[0]!.sheet)).toBe(added.body.id)
    expect((await check(added.body.id)).body).toMatchObject({ intact: true, kind: 'addendum', count: 0 })
    expect((await sheetOf(id)).hash).toBe(hash)
  })

  it('needs a seal before it, words in it, and who runs the briefing', async () => {
    const open = await steps.open()
    expect((await foreman.post<Problem>(`/api/briefings/${open}/addenda`, { text: 'Too early' })).body.data.code).toBe('notSealed')
    expect((await foreman.post(`/api/briefings/${open}/addenda`, { text: ' ' })).status).toBe(400)
    expect((await (await company.as('office')).post(`/api/briefings/${open}/addenda`, { text: 'x' })).status).toBe(403)
  })
})

describe('the public check', () => {
  it('says intact, site code, date and how many, and nothing else of the sheet', async () => {
    const { hash } = await sheetOf(await sealedBriefing())
    const answer = await check(hash)
    expect(answer.body).toEqual({ intact: true, site: 'QUARRY', date: '2026-12-01', count: 3, kind: 'sheet', signature: 'valid', clockWasSet: true })
    expect((await check(hash.toUpperCase())).body.intact).toBe(true)
    expect(answer.text).not.toMatch(/Abbott|Ferrer|Toledo/)
  })

  it('answers 404 to a hash that nobody sealed', async () => {
    for (const hash of ['0'.repeat(64), 'x', 'not-a-hash']) expect((await check(hash)).status).toBe(404)
  })

  it('is recomputed at each call: one changed letter, a changed link or another signature is seen', async () => {
    const { hash } = await sheetOf(await sealedBriefing())
    const row = await company.db('sheets').where({ hash }).first()
    await company.db.raw('drop trigger sheets_no_update')
    try {
      for (const change of [{ body: row.body.replace('Wren Abbott', 'Wren Abbot') }, { body: 'not json' }, { previousHash: '1'.repeat(64) }, { signature: Buffer.alloc(64).toString('base64url') }]) {
        await company.db('sheets').where({ hash }).update(change)
        expect((await check(hash)).body.intact, JSON.stringify(change).slice(0, 40)).toBe(false)
        await company.db('sheets').where({ hash }).update({ body: row.body, previousHash: row.previousHash, signature: row.signature })
      }
      await company.db('sheets').where({ hash: row.previousHash }).update({ body: '{"kind":"sheet"}' })
      expect((await check(hash)).body.intact).toBe(false)
    }
    finally {
      await company.db.raw('create trigger sheets_no_update before update on sheets begin select raise(abort, \'sheets is append-only\'); end')
    }
  })
})

describe('the sheet on paper', () => {
  it('reads back with every name, its hash and a QR that opens its check, in both languages', async () => {
    const id = await sealedBriefing()
    const { hash } = await sheetOf(id)
    const { jsqr, zxing } = await decodeQr(rasterise((await fetchPdf(foreman, `/api/briefings/${id}/sheet.pdf`)).bytes, 150)[0]!)
    expect([jsqr, zxing]).toEqual([`${company.server.origin}/check/${hash}`, `${company.server.origin}/check/${hash}`])
    await foreman.post(`/api/briefings/${id}/addenda`, { text: 'The ladder was mended at nine.' })
    const english = await fetchPdf(foreman, `/api/briefings/${id}/sheet.pdf`)
    expect([english.type, english.name]).toEqual(['application/pdf', expect.stringContaining('2026-12-01-QUARRY-')])
    const text = (await pagesOf(english.bytes)).join(' ')
    for (const words of ['Toolbox talk: sign-in sheet', 'Wren Abbott', 'Lupe Ferrer', 'Ada Cole', 'Redpump', 'witness Odd Nilsen', 'can\'t read or write', 'Odd Nilsen', hash, 'The ladder was mended at nine.', 'Page 1 of', '34 °F']) expect(text).toContain(words)
    const spanish = (await pagesOf((await fetchPdf(foreman, `/api/briefings/${id}/sheet.pdf?language=es`)).bytes)).join(' ')
    for (const words of ['hoja de firmas', 'no lee o no escribe', 'testigo Odd Nilsen', 'Página 1 de']) expect(spanish).toContain(words)
    expect((await (await company.as('other-foreman')).get(`/api/briefings/${id}/sheet.pdf`)).status).toBe(404)
  })

  it('repeats its header row over pages and never cuts a line in two', async () => {
    const id = await steps.open()
    for (let index = 0; index < 45; index++) await steps.sign(foreman, id, { method: 'foremanDevice', visitor: { name: `Guest number ${index}`, company: 'Redpump' } })
    await steps.seal(id)
    const pages = await pagesOf((await fetchPdf(foreman, `/api/briefings/${id}/sheet.pdf`)).bytes)
    expect(pages.length).toBeGreaterThan(1)
    expect(pages.slice(0, 2).every(page => page.includes('Employer, trade'))).toBe(true)
    expect(pages.at(-1)).toContain(`Page ${pages.length} of ${pages.length}`)
  })
})

describe('the poster', () => {
  it('carries a QR of the site\'s page that two readers decode, with its quiet zone and its link in words', async () => {
    const { bytes, type } = await fetchPdf(foreman, '/api/sites/site-a/poster.pdf')
    expect(type).toBe('application/pdf')
    const link = `${company.server.origin}/s/QUARRY`
    const pages = await pagesOf(bytes)
    expect(pages).toHaveLength(1)
    for (const words of ['Quarry Lane', link, 'Scan this', 'Escanee esto']) expect(pages[0]).toContain(words)
    const { jsqr, zxing, corners, dark } = await decodeQr(rasterise(bytes)[0]!)
    expect([jsqr, zxing]).toEqual([link, link])
    const [topLeft, topRight] = corners as [{ x: number, y: number }, { x: number, y: number }]
    const side = topRight.x - topLeft.x
    const millimetres = side / 120 * 25.4
    const modules = 29
    expect(millimetres / modules).toBeGreaterThan(2)
    const quiet = 3.5 * side / modules
    for (let step = 0; step <= 40; step++) expect([dark(topLeft.x - quiet + step * (side + 2 * quiet) / 40, topLeft.y - quiet), dark(topLeft.x - quiet, topLeft.y + step * side / 40)]).toEqual([false, false])
  })

  it('is for who reaches the site', async () => {
    expect((await (await company.as('other-foreman')).get('/api/sites/site-a/poster.pdf')).status).toBe(404)
    expect((await (await company.as('hand-a')).get('/api/sites/site-a/poster.pdf')).status).toBe(403)
  })
})
