import { deflateRawSync } from 'node:zlib'
import { beforeEach, describe, expect, test } from 'vitest'
import writeXlsxFile from 'write-excel-file/node'
import type { Db } from '../../../server/data/database'
import { importCredentials } from '../../../server/services/imports/import-credentials'
import { importPeople } from '../../../server/services/imports/import-people'
import { guardZip } from '../../../server/services/imports/zip-guard'
import { readWrittenDate } from '../../../server/services/imports/written-dates'
import { hold, openCredentialCompany, workOf } from '../../support/credential-company'

let db: Db
beforeEach(async () => {
  db = await openCredentialCompany()
  return () => db.destroy()
})

const csv = (...lines: string[]) => Buffer.from(lines.join('\r\n'))
const plain = { dryRun: false, skipRejected: false }
const people = async (bytes: Buffer, query: Partial<{ dryRun: boolean, skipRejected: boolean, dateOrder: 'mdy' | 'dmy' }> = {}) => importPeople(await workOf(db, 'ada'), bytes, { ...plain, ...query })
const cards = async (bytes: Buffer, query: object = {}) => importCredentials(await workOf(db, 'ada'), bytes, { ...plain, ...query })
const countPeople = async () => Number((await db('people').count({ n: '*' }).first())!.n)

describe('people', () => {
  test('fills in what the file lacks', async () => {
    expect(await people(csv('Name,Badge', 'Ana de la Cruz,3001'))).toMatchObject({ rows: 1, created: 1, updated: 0, rejected: [] })
    expect(await db('people').where({ badge: '3001' }).first()).toMatchObject({ sortName: 'de la Cruz, Ana', role: 'worker', employer: 'Test Walls', employerKind: 'own', language: 'en', hiredOn: '2026-12-01' })
  })

  test('matches by badge or e-mail, changes only what differs, and empty cells change nothing', async () => {
    const answer = await people(csv('Gafete;Correo;Teléfono;Cuadrilla', 'hal;;555 0100;South', ';fay@test.example;;', 'INES;;;'))
    expect(answer).toMatchObject({ rows: 3, created: 0, updated: 1, unchanged: 2, rejected: [] })
    expect(answer.mapping).toEqual([{ header: 'Gafete', field: 'badge' }, { header: 'Correo', field: 'email' }, { header: 'Teléfono', field: 'phone' }, { header: 'Cuadrilla', field: 'crew' }])
    expect(await db('people').where({ id: 'hal' }).first()).toMatchObject({ phone: '555 0100', crewId: 'south', email: 'hal@test.example', version: 2 })
  })

  test('is all or nothing: one bad row saves none and names row, field and why', async () => {
    const before = await countPeople()
    const file = csv('name,badge,email,role', 'Good One,1,,', 'Bad Mail,2,nowhere,', 'Boss,3,,safety', 'Again,1,,')
    await expect(people(file)).rejects.toMatchObject({ kind: 'unprocessable', code: 'rejectedRows', details: { data: { rows: 4, rejected: [{ row: 3, field: 'email' }, { row: 4, field: 'role' }, { row: 5, field: 'badge' }] } } })
    expect(await countPeople()).toBe(before)
    expect(await people(file, { dryRun: true })).toMatchObject({ created: 1, rejected: [{ row: 3 }, { row: 4 }, { row: 5 }] })
    expect(await countPeople()).toBe(before)
    expect(await people(file, { skipRejected: true })).toMatchObject({ created: 1 })
    expect(await countPeople()).toBe(before + 1)
    expect(await db('audit').where({ action: 'import.people' }).count({ n: '*' }).first()).toEqual({ n: 1 })
  })

  test('never drops surplus cells, and never guesses a date', async () => {
    const file = csv('name,badge,hired', 'A B,1,3/4/2026', 'C D,2,3/14/2026,surplus', 'E F,3,2026-02-30')
    expect(await people(file, { dryRun: true })).toMatchObject({ asksDateOrder: true, rejected: [{ row: 2, field: 'hiredOn' }, { row: 3, field: 'row' }, { row: 4, field: 'hiredOn' }] })
    await people(csv('name,badge,hired', 'A B,1,3/4/2026'), { dateOrder: 'dmy' })
    expect(await db('people').where({ badge: '1' }).first()).toMatchObject({ hiredOn: '2026-04-03' })
  })

  test('reads UTF-8 with a mark, windows-1252, and tabs', async () => {
    await people(Buffer.from('\uFEFFname\tbadge\ttrade\n"Inés Ávila"\t7\t"brace, steel"\n'))
    await people(Buffer.concat([Buffer.from('name,badge\nPe'), Buffer.from([0xF1]), Buffer.from('a Gil,8\n')]))
    expect(await db('people').whereIn('badge', ['7', '8']).orderBy('badge').pluck('name')).toEqual(['Inés Ávila', 'Peña Gil'])
  })

  test('reads a workbook with real dates', async () => {
    const sheet = await writeXlsxFile([['Name', 'Badge', 'Hire date'].map(value => ({ value })), [{ value: 'Kim Sheet' }, { value: 9001, type: Number }, { value: new Date('2026-03-04T00:00:00Z'), type: Date, format: 'yyyy-mm-dd' }]], {}).toBuffer()
    expect(await people(sheet)).toMatchObject({ created: 1 })
    expect(await db('people').where({ badge: '9001' }).first()).toMatchObject({ name: 'Kim Sheet', hiredOn: '2026-03-04' })
  })

  test.each<[string, Buffer, string]>([
    ['an empty file', csv('name,badge'), 'emptyFile'],
    ['an open quote', csv('name,badge', '"A,1'), 'brokenCsv'],
    ['a file without a key column', csv('name,phone', 'A,1'), 'missingColumn'],
    ['two columns for one thing', csv('badge,Gafete', '1,2'), 'doubleColumn'],
    ['a picture', Buffer.from([0x89, 0x50, 0x4E, 0x47, 0, 0, 0]), 'wrongFileType'],
    ['a broken workbook', Buffer.concat([Buffer.from([0x50, 0x4B, 3, 4]), Buffer.alloc(40)]), 'brokenSheet'],
    ['too many rows', csv('badge', ...Array.from({ length: 20_001 }, (_, n) => String(n))), 'tooManyRows'],
  ])('refuses %s', async (_what, bytes, code) => {
    await expect(people(bytes)).rejects.toMatchObject({ code })
  })
})

/** A zip of one entry whose directory tells the sizes given. */
function zipOf(content: Buffer): Buffer {
  const packed = deflateRawSync(content)
  const local = Buffer.alloc(30)
  local.writeUInt32LE(0x04034B50, 0)
  local.writeUInt16LE(8, 8)
  const entry = Buffer.alloc(46)
  entry.writeUInt32LE(0x02014B50, 0)
  entry.writeUInt16LE(8, 10)
  entry.writeUInt32LE(packed.length, 20)
  entry.writeUInt32LE(10, 24)
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054B50, 0)
  end.writeUInt16LE(1, 10)
  end.writeUInt32LE(30 + packed.length, 16)
  return Buffer.concat([local, packed, entry, end])
}

test('a small workbook that unfolds to more than 100 MB is refused, whatever its directory says', () => {
  expect(() => guardZip(zipOf(Buffer.alloc(101 * 1024 * 1024)))).toThrow(/unfolds/)
  expect(() => guardZip(zipOf(Buffer.alloc(1024)))).not.toThrow()
})

test.each([
  ['2026-12-01', undefined, { date: '2026-12-01' }], ['12/31/2026', undefined, { date: '2026-12-31' }], ['31/12/2026', undefined, { date: '2026-12-31' }],
  ['3/4/2026', undefined, { problem: 'dateOrder' }], ['3/3/2026', undefined, { date: '2026-03-03' }], ['3/4/2026', 'mdy', { date: '2026-03-04' }], ['3.4.2026', 'dmy', { date: '2026-04-03' }],
  ['13/4/2026', 'mdy', { problem: 'notADate' }], ['2026-02-29', undefined, { problem: 'notADate' }], ['soon', undefined, { problem: 'notADate' }],
] as const)('%s read as %s', (text, order, read) => {
  expect(readWrittenDate(text, order)).toEqual(read)
})

describe('credentials', () => {
  test('come in waiting to be verified, by badge or e-mail and by code or name in either language', async () => {
    const file = csv('badge,correo,credential,issued,expires,obra,number', 'hal,,First aid and CPR,2026-01-10,2028-01-10,,77', ',fay@test.example,escaleras,2026-02-01,,,', 'ines,,site-orientation,2026-11-02,,Quarry Lane,')
    expect(await cards(file)).toMatchObject({ rows: 3, created: 3, rejected: [] })
    expect(await db('credentials').orderBy('issuedOn').select('personId', 'verification', 'expiresOn', 'siteId')).toEqual([
      { personId: 'hal', verification: 'unverified', expiresOn: '2028-01-10', siteId: null },
      { personId: 'fay', verification: 'unverified', expiresOn: null, siteId: null },
      { personId: 'ines', verification: 'unverified', expiresOn: null, siteId: 'site1' },
    ])
    expect(await cards(file)).toMatchObject({ created: 0, updated: 0, unchanged: 3 })
  })

  test('are refused where the form refuses them, and where a judged card would change', async () => {
    await hold(db, { issuedOn: '2026-01-10', expiresOn: '2028-01-10' })
    const file = csv('badge,type,issued,expires', 'nobody,ladders,2026-01-01,', 'hal,stacking,2026-01-01,', 'hal,first-aid-cpr,2026-01-02,', 'hal,ladders,2026-01-01,2027-01-01', 'hal,first-aid-cpr,2026-01-10,2029-01-10', 'hal,juggling,2026-01-01,', 'hal,site-orientation,2026-01-01,')
    const { rejected, created } = await cards(file, { dryRun: true })
    expect(created).toBe(0)
    expect(rejected.map(row => [row.row, row.field])).toEqual([[2, 'badge'], [3, 'type'], [4, 'expiresOn'], [5, 'expiresOn'], [6, 'type'], [7, 'type'], [8, 'site']])
  })
})
