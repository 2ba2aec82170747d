import { deflateRawSync } from 'node:zlib'
import { beforeAll, expect, test } from 'vitest'
import { signedIn, type Client } from '../support/client'

let office: Client
beforeAll(async () => {
  office = await signedIn('office')
})
const send = (bytes: Uint8Array, name = 'people.xlsx') => {
  const form = new FormData()
  form.append('file', new Blob([new Uint8Array(bytes)]), name)
  return office.post<{ data: { code: string } }>('/api/imports/people?dryRun=true', form)
}

/** A zip of one packed entry of that name. */
function zipOf(name: string, content: Buffer): Buffer {
  const packed = deflateRawSync(content)
  const local = Buffer.alloc(30)
  local.writeUInt32LE(0x04034B50, 0)
  local.writeUInt16LE(8, 8)
  local.writeUInt16LE(name.length, 26)
  const entry = Buffer.alloc(46)
  entry.writeUInt32LE(0x02014B50, 0)
  entry.writeUInt16LE(8, 10)
  entry.writeUInt32LE(packed.length, 20)
  entry.writeUInt16LE(name.length, 28)
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054B50, 0)
  end.writeUInt16LE(1, 10)
  end.writeUInt32LE(30 + name.length + packed.length, 16)
  return Buffer.concat([local, Buffer.from(name), packed, entry, Buffer.from(name), end])
}
const rss = async () => (await office.get<{ status: string }>('/api/health')).status

test('a file of 50 MB is refused with 413 before it is read, and the server goes on', async () => {
  const started = Date.now()
  const answer = await send(new Uint8Array(50 * 1024 * 1024), 'people.csv')
  expect([answer.status, answer.body.data.code]).toEqual([413, 'tooLarge'])
  expect(Date.now() - started).toBeLessThan(5000)
  expect(await rss()).toBe(200)
})

test('a workbook of 1 MB that unfolds to 1 GB is refused with 422, and the server goes on', async () => {
  const bomb = zipOf('xl/worksheets/sheet1.xml', Buffer.alloc(1024 * 1024 * 1024))
  expect(bomb.length).toBeLessThan(1.2 * 1024 * 1024)
  const answer = await send(bomb)
  expect([answer.status, answer.body.data.code]).toEqual([422, 'zipBomb'])
  expect(await rss()).toBe(200)
})

test('a workbook with macros is refused with 422 and told apart from a broken one', async () => {
  const macros = await send(zipOf('xl/vbaProject.bin', Buffer.from('macros')), 'people.xlsm')
  expect([macros.status, macros.body.data.code]).toEqual([422, 'macroWorkbook'])
  const broken = await send(zipOf('xl/workbook.xml', Buffer.from('<workbook')))
  expect([broken.status, broken.body.data.code]).toEqual([422, 'brokenSheet'])
})
