import { mkdirSync } from 'node:fs'
import { dirname } from 'node:path'
import knex, { type Knex } from 'knex'
import { knexConfigFor, renamePlucked } from './knex-config'
import { migrationSource } from './migrations'

/** A database handle or an open transaction: data functions take either, always first. */
export type Db = Knex

/** Opens the SQLite file (made when missing) and brings its schema up to date. Throws when a migration fails. */
export async function openDatabase(filename: string): Promise<Db> {
  if (filename !== ':memory:') mkdirSync(dirname(filename), { recursive: true })
  const db = knex({ ...knexConfigFor(filename), migrations: { migrationSource } })
  renamePlucked(db)
  await db.migrate.latest()
  return db
}
