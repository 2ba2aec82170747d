import fc from 'fast-check'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { addDays } from '#shared/domain/dates'
import { credentialStateOn, effectiveCredential, expiryAcrossDuties, standingCredential, type Credential, type CredentialType, type DutyRecency } from '#shared/domain/validity'
import type { Verification } from '#shared/domain/states'
import type { Db } from '../../../server/data/database'
import { countCredentials, listCredentials } from '../../../server/data/views/credential-list'
import { insertTestPerson, openTestDatabase } from '../../support/work'

const today = '2028-02-29'
const at = '2026-01-01T00:00:00.000Z'
const types: (CredentialType & { id: string })[] = [
  { id: 't1', code: 'first-aid', validity: { kind: 'printed' }, basis: 'issuer', leadDays: 60 },
  { id: 't2', code: 'orientation', validity: { kind: 'never' }, basis: 'site', leadDays: 30, perSite: true },
  { id: 't3', code: 'pump-and-hose', validity: { kind: 'period', months: 12, anchor: 'day' }, basis: 'company', leadDays: 60, module: 'pump-and-hose' },
]
let db: Db

beforeAll(async () => {
  db = await openTestDatabase()
  await insertTestPerson(db, { id: 'a' })
  await insertTestPerson(db, { id: 'b' })
  for (const id of ['s1', 's2']) await db('sites').insert({ id, code: id, name: id, timeZone: 'America/Denver', createdAt: at })
  for (const type of types) {
    await db('credentialTypes').insert({
      id: type.id, code: type.code, nameEn: type.code, nameEs: type.code, validityKind: type.validity.kind, months: type.validity.kind === 'period' ? type.validity.months : null,
      anchor: type.validity.kind === 'period' ? 'day' : null, basis: type.basis, leadDays: type.leadDays, perSite: type.perSite ?? false, source: 'test', module: type.module ?? null, createdAt: at,
    })
  }
  for (const [id, months] of [['d1', 6], ['d2', 3]] as const) {
    await db('duties').insert({ id, code: id, nameEn: id, nameEs: id, recencyMonths: months, createdAt: at })
    await db('rules').insert({ id: `r-${id}`, dutyId: id, createdAt: at })
    await db('ruleTypes').insert({ ruleId: `r-${id}`, groupNumber: 0, typeId: 't3' })
  }
})
afterAll(() => db.destroy())

const near = fc.integer({ min: -400, max: 400 }).map(days => addDays(today, days))
const edge = fc.constantFrom(-1, 0, 1, 29, 30, 31, 59, 60, 61).map(days => addDays(today, days))
const someDay = fc.oneof(near, edge)
const held = fc.record({
  personId: fc.constantFrom('a', 'b'),
  type: fc.constantFrom(...types),
  siteId: fc.constantFrom(null, 's1', 's2'),
  issuedOn: someDay,
  expiresOn: fc.option(someDay, { nil: null }),
  verification: fc.constantFrom<Verification>('verified', 'verified', 'verified', 'unverified', 'rejected'),
  withdrawnOn: fc.option(someDay, { nil: null, freq: 4 }),
  judgedOn: fc.option(someDay, { nil: null, freq: 4 }),
})
const doneDays = fc.uniqueArray(fc.record({ personId: fc.constantFrom('a', 'b'), dutyId: fc.constantFrom('d1', 'd2'), doneOn: near }), { selector: row => `${row.personId}${row.dutyId}${row.doneOn}`, maxLength: 4 })

type Row = Credential & { personId: string }

/** What the pure rules say of the same rows. */
function byRules(rows: Row[], done: { personId: string, dutyId: string, doneOn: string }[]) {
  const recenciesOf = (personId: string): DutyRecency[] => [['d1', 6], ['d2', 3]].map(([dutyId, recencyMonths]) => ({
    recencyMonths: recencyMonths as number,
    lastDoneOn: done.filter(day => day.personId === personId && day.dutyId === dutyId && day.doneOn <= today).map(day => day.doneOn).sort().at(-1) ?? null,
  }))
  return rows.map((row) => {
    const type = types.find(type => type.code === row.type)!
    return { ...row, expiresOn: type.module ? expiryAcrossDuties(row, type, recenciesOf(row.personId)) : row.expiresOn }
  })
}

test('the list\'s SQL says the same of state, expiry and the effective credential as the rules', async () => {
  await fc.assert(fc.asyncProperty(fc.array(held, { maxLength: 12 }), doneDays, async (generated, done) => {
    const rows: Row[] = generated.map(({ type, siteId, ...row }, index) => ({ ...row, id: `c${String(index).padStart(2, '0')}`, type: type.code, siteId: type.perSite ? siteId ?? 's1' : siteId }))
    await db('credentials').delete()
    await db('dutyDays').delete()
    for (const day of done) await db('dutyDays').insert(day)
    for (const { type, judgedOn, ...row } of rows) {
      await db('credentials').insert({ ...row, typeId: types.find(known => known.code === type)!.id, details: judgedOn ? JSON.stringify({ judgedOn }) : null, withdrawalReason: row.withdrawnOn ? 'x' : null, cardCode: row.id, createdAt: at })
    }
    const list = (query: object) => listCredentials(db, { scope: { all: true }, today, ...query }, { language: 'en', limit: 100, offset: 0 })
    const expected = byRules(rows, done)
    const typeOf = (row: Credential) => types.find(type => type.code === row.type)!

    const all = await list({})
    expect(Object.fromEntries(all.items.map(item => [item.id, [item.state, item.expiresOn]]))).toEqual(Object.fromEntries(expected.map(row => [row.id, [credentialStateOn(row, typeOf(row), today), row.expiresOn]])))

    const chosen = (choose: typeof effectiveCredential) => expected.filter(row => choose(expected.filter(other => other.personId === row.personId), typeOf(row), today, row.siteId)?.id === row.id)
    expect((await list({ isEffective: true })).items.map(item => item.id).sort()).toEqual(chosen(effectiveCredential).map(row => row.id).sort())

    const standing = chosen(standingCredential).filter(row => row.expiresOn !== null && row.expiresOn <= addDays(today, 60))
    expect((await list({ within: 60, includeExpired: true })).items.map(item => item.id).sort()).toEqual(standing.map(row => row.id).sort())
    const ahead = standing.filter(row => row.expiresOn! >= today)
    expect((await list({ within: 60 })).items.map(item => item.id).sort()).toEqual(ahead.map(row => row.id).sort())
    expect(await countCredentials(db, { scope: { all: true }, today, within: 60 })).toBe(ahead.length)
  }), { numRuns: 150, seed: 20261201 })
}, 60_000)
