import knex from 'knex'
import { describe, expect, it } from 'vitest'
import { knexConfigFor } from '../../../server/data/knex-config'
import { migrations, migrationSource } from '../../../server/data/migrations'
import { openTestDatabase } from '../../support/work'
import { filesBelow } from '../../support/project-files'

async function schemaOf(db: Awaited<ReturnType<typeof openTestDatabase>>): Promise<string[]> {
  const rows: { sql: string | null }[] = await db('sqliteMaster').whereNot('name', 'like', 'knex%').whereNot('name', 'like', 'sqlite%').select('sql').from('sqlite_master')
  return rows.map(row => row.sql ?? '').sort()
}

describe('migrations', () => {
  it('in the registry are those in the folder', () => {
    expect(Object.keys(migrations)).toEqual(filesBelow('migrations', '.ts'))
  })

  it('go down to nothing and up again to the same schema', async () => {
    const db = await openTestDatabase()
    const before = await schemaOf(db)
    expect(before.length).toBeGreaterThan(30)
    await db.migrate.rollback({ migrationSource }, true)
    expect(await schemaOf(db)).toEqual([])
    await db.migrate.latest({ migrationSource })
    expect(await schemaOf(db)).toEqual(before)
    await db.destroy()
  })

  it('go down and up one at a time', async () => {
    const db = knex({ ...knexConfigFor(':memory:'), migrations: { migrationSource } })
    for (const _name of Object.keys(migrations)) {
      await db.migrate.up()
      await db.migrate.down()
      await db.migrate.up()
    }
    expect((await db.migrate.list())[1]).toEqual([])
    await db.destroy()
  })
})

describe('a database in use', () => {
  it('is taken through every later migration with its rows kept', async () => {
    const db = knex({ ...knexConfigFor(':memory:'), migrations: { migrationSource } })
    for (let count = 0; count < 6; count += 1) await db.migrate.up()
    const at = '2026-01-05T14:00:00.000Z'
    await db('people').insert(['one', 'two'].map(id => ({ id, name: id, sortName: id, badge: id, role: 'worker', language: 'en', employer: 'Test', employerKind: 'own', hiredOn: '2026-01-05', createdAt: at, updatedAt: at })))
    await db('crews').insert({ id: 'crew', name: 'Crew', foremanId: 'one', createdAt: at })
    await db('people').where({ id: 'two' }).update({ crewId: 'crew' })
    await db('sites').insert({ id: 'site', code: 'site', name: 'Site', timeZone: 'UTC', superintendentId: 'one', createdAt: at })
    await db('credentialTypes').insert({ id: 'type', code: 'type', nameEn: 'Type', nameEs: 'Tipo', validityKind: 'never', basis: 'company', source: 'Company rule', createdAt: at })
    await db('credentials').insert({ id: 'card', personId: 'two', typeId: 'type', issuedOn: '2026-01-05', verification: 'verified', verifiedBy: 'one', cardCode: 'CODE', createdAt: at })
    await db('attempts').insert({ id: 'attempt', personId: 'two', module: 'stacking', language: 'en', seed: 's', served: '{}', startedAt: at, endsAt: at })
    await db('audit').insert({ seq: 1, at, actorId: 'one', action: 'a', subjectKind: 'person', subjectId: 'two', detailsDigest: '', previousHash: '', hash: '' })
    await db('mail').insert({ id: 'mail', key: 'k', recipient: 'a@test.example', personId: 'two', subject: 's', body: 'b', state: 'queued', tries: 0, nextTryAt: at, createdAt: at })
    const before = await Promise.all(['people', 'crews', 'credentials', 'attempts', 'audit', 'mail'].map(table => db(table).select('*')))
    await db.migrate.latest()
    const after = await Promise.all(['people', 'crews', 'credentials', 'attempts', 'audit', 'mail'].map(table => db(table).select('*')))
    expect(after).toMatchObject(before)
    expect(await db.raw('pragma foreign_key_check')).toEqual([])
    expect((await db.migrate.list())[1]).toEqual([])
    await db.destroy()
  })
})

describe('an opened database', () => {
  it('keeps what it acknowledged through a power cut, and its foreign keys', async () => {
    const db = await openTestDatabase()
    const pragma = async (name: string) => Object.values((await db.raw(`pragma ${name}`))[0])[0]
    expect(await pragma('journal_mode')).toBe('wal')
    expect(await pragma('synchronous')).toBe(2)
    expect(await pragma('foreign_keys')).toBe(1)
    expect(await pragma('busy_timeout')).toBe(5000)
    await db.destroy()
  })

  it('refuses a state word that the schema does not know', async () => {
    const db = await openTestDatabase()
    const person = { id: 'p', name: 'P', sortName: 'P', badge: '1', language: 'en', employer: 'Test', employerKind: 'own', hiredOn: '2026-01-01', createdAt: '', updatedAt: '' }
    await expect(db('people').insert({ ...person, role: 'king' })).rejects.toThrow('CHECK constraint failed')
    await db('people').insert({ ...person, role: 'worker' })
    await db.destroy()
  })

  it('lets nobody change or delete a sealed sheet or an audit row', async () => {
    const db = await openTestDatabase()
    await db('sites').insert({ id: 's', code: 'S', name: 'S', timeZone: 'UTC', createdAt: '' })
    await db('sheets').insert({ hash: 'h', siteId: 's', number: 1, kind: 'addendum', body: '{}', sealedAt: '' })
    await db('audit').insert({ seq: 1, at: '', action: 'a', subjectKind: 'x', subjectId: 'y', detailsDigest: '', previousHash: '', hash: '' })
    await expect(db('sheets').update({ body: '{"changed":true}' })).rejects.toThrow('append-only')
    await expect(db('sheets').delete()).rejects.toThrow('append-only')
    await expect(db('audit').update({ action: 'b' })).rejects.toThrow('append-only')
    await expect(db('audit').delete()).rejects.toThrow('append-only')
    await db.destroy()
  })
})
