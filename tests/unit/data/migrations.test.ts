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
