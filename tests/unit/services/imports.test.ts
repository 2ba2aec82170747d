import { deflateRawSync } from 'node:zlib'
import { beforeEach, describe, expect, test } from 'vitest'
import writeXlsxFile from 'write-excel-file/node'
import type { Db } from '../../../server/data/database'
import { importCredentials } from '../../../server/services/imports/import-credentials'
import { importPeople } from '../../../server/services/imports/import-people'
import { readProgress } from '../../../server/services/imports/progress'
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
const people = async (bytes: Buffer, query: Partial<{ dryRun: boolean, skipRejected: boolean, dateOrder: 'mdy' | 'dmy', columns: string, key: string }> = {}) => importPeople(await workOf(db, 'ada'), bytes, { ...plain, ...query })
const cards = async (bytes: Buffer, query: object = {}) => importCredentials(await workOf(db, 'ada'), bytes, { ...plain, ...query })
const countPeople = async () => Number((await db('people').count({ n: '*' }).first())!.n)

/** A CSV as an office sends it: a title, other names in another order, semicolons, windows-1252, every way to write a date. */
const nastyPeople = Buffer.from([
  'Lista de personal;;;;;;;', '', 'Apellidos;Nombres;N\xFAmero de empleado;Fecha de ingreso;Tel\xE9fono m\xF3vil;Lengua;Notas;Cuadrilla',
  'Mu\xF1oz Pe\xF1a;Jos\xE9;4001;1-dic-2025;303 555 0177;espa\xF1ol;"dice: ""s\xED""; ma\xF1ana";North', 'Kessler;Ada;4002;45992;;English;;', 'Le;Binh;4003;12/01/2025 0:00;;;;', 'Moss;Tom;4004;Dec 31, 2025;;;;Nowhere',
].join('\r\n'), 'latin1')

describe('a nasty file', () => {
  test('is understood by its header under a title, in Latin letters, with first and last names and dates of every kind', async () => {
    const answer = await people(nastyPeople, { dryRun: true, dateOrder: 'mdy' })
    expect(answer.mapping.map(column => column.field)).toEqual(['lastName', 'firstName', 'badge', 'hiredOn', 'phone', 'language', null, 'crew'])
    expect(answer).toMatchObject({ rows: 4, created: 3, rejected: [{ row: 7, field: 'crew', code: 'unknownCrew' }] })
    await people(nastyPeople, { skipRejected: true, dateOrder: 'mdy' })
    // 45992 is 2025-12-01: days since 1899-12-30, ECMA-376 part 1, 18.17.4.1.
    expect(await db('people').whereIn('badge', ['4001', '4002', '4003']).orderBy('badge').select('name', 'hiredOn', 'phone', 'language', 'crewId')).toEqual([
      { name: 'José Muñoz Peña', hiredOn: '2025-12-01', phone: '303 555 0177', language: 'es', crewId: 'north' },
      { name: 'Ada Kessler', hiredOn: '2025-12-01', phone: null, language: 'en', crewId: null },
      { name: 'Binh Le', hiredOn: '2025-12-01', phone: null, language: 'en', crewId: null },
    ])
    expect(await people(nastyPeople, { skipRejected: true, dateOrder: 'mdy' })).toMatchObject({ created: 0, updated: 0, unchanged: 3 })
  })

  test('whose columns nobody knows is asked about with its columns, and what was said is remembered once saved', async () => {
    const file = csv('Wer,Marke', 'Ana Sol,5001')
    await expect(people(file, { dryRun: true })).rejects.toMatchObject({ code: 'missingColumn', details: { data: { mapping: [{ header: 'Wer', field: null }, { header: 'Marke', field: null }], example: ['Ana Sol', '5001'] } } })
    const columns = JSON.stringify({ Wer: 'name', Marke: 'badge' })
    expect(await people(file, { dryRun: true, columns })).toMatchObject({ created: 1 })
    await expect(people(file, { dryRun: true })).rejects.toMatchObject({ code: 'missingColumn' })
    await people(file, { columns })
    expect(await people(csv('MARKE,WER', '5002,Bo Lind'))).toMatchObject({ created: 1, mapping: [{ field: 'badge' }, { field: 'name' }] })
    await people(csv('badge,name,crew', '5003,Cy Ray,Nowhere'), { columns: JSON.stringify({ crew: '' }) })
    expect(await db('people').where({ badge: '5003' }).first('crewId')).toEqual({ crewId: null })
    await expect(people(file, { columns: '{"Wer":"salary"}' })).rejects.toMatchObject({ details: { fields: { columns: expect.any(String) as string } } })
  })

  test('with a key says how far it has come', async () => {
    const many = csv('badge,name', ...Array.from({ length: 1000 }, (_, index) => `B${index},Person ${index}`))
    const seen = new Set<string>()
    let isDone = false
    const run = people(many, { key: 'key-of-this-run' }).finally(() => isDone = true)
    while (!isDone) {
      await new Promise(done => setImmediate(done))
      const { phase, done, total } = readProgress('ada', 'key-of-this-run')
      if (total > 0) seen.add(`${phase} ${done} of ${total}`)
    }
    await run
    expect([...seen]).toEqual(expect.arrayContaining(['checking 500 of 1000', 'saving 500 of 1000']))
    expect(readProgress('someone-else', 'key-of-this-run')).toEqual({ phase: 'reading', done: 0, total: 0 })
  })

  test('of 10,000 rows is taken whole, and again without a change', { timeout: 60_000 }, async () => {
    const many = csv('badge,name,email', ...Array.from({ length: 10_000 }, (_, index) => `B${index},Person ${index},p${index}@test.example`))
    expect(await people(many)).toMatchObject({ rows: 10_000, created: 10_000, rejected: [] })
    expect(await people(many)).toMatchObject({ rows: 10_000, created: 0, updated: 0, unchanged: 10_000 })
  })
})

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

/** A zip of one entry of that name. */
function zipOf(content: Buffer, name = ''): Buffer {
  const packed = deflateRawSync(content)
  const local = Buffer.alloc(30)
  local.writeUInt32LE(0x04034B50, 0)
  local.writeUInt16LE(8, 8)
  const entry = Buffer.alloc(46)
  entry.writeUInt32LE(0x02014B50, 0)
  entry.writeUInt16LE(8, 10)
  entry.writeUInt32LE(packed.length, 20)
  entry.writeUInt32LE(10, 24)
  entry.writeUInt16LE(name.length, 28)
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054B50, 0)
  end.writeUInt16LE(1, 10)
  end.writeUInt32LE(30 + packed.length, 16)
  return Buffer.concat([local, packed, entry, Buffer.from(name), end])
}

test('a small workbook that unfolds to more than 100 MB is refused, whatever its directory says', () => {
  expect(() => guardZip(zipOf(Buffer.alloc(101 * 1024 * 1024)))).toThrow(/unfolds/)
  expect(() => guardZip(zipOf(Buffer.alloc(1024)))).not.toThrow()
  expect(() => guardZip(zipOf(Buffer.alloc(10), 'xl/vbaProject.bin'))).toThrow(/macros/)
})

test.each([
  ['2026-12-01', undefined, { date: '2026-12-01' }], ['12/31/2026', undefined, { date: '2026-12-31' }], ['31/12/2026', undefined, { date: '2026-12-31' }],
  ['3/4/2026', undefined, { problem: 'dateOrder' }], ['3/3/2026', undefined, { date: '2026-03-03' }], ['3/4/2026', 'mdy', { date: '2026-03-04' }], ['3.4.2026', 'dmy', { date: '2026-04-03' }],
  ['1-Dec-2026', undefined, { date: '2026-12-01' }], ['Dec 1, 2026', undefined, { date: '2026-12-01' }], ['1 de enero 2026', undefined, { date: '2026-01-01' }], ['12/31/2026 12:00:00 AM', undefined, { date: '2026-12-31' }],
  ['46357', undefined, { date: '2026-12-01' }], ['99999', undefined, { problem: 'notADate' }], ['12/1/26', undefined, { problem: 'notADate' }], ['1-Foo-2026', undefined, { problem: 'notADate' }],
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
