import type { Db } from './database'

/** A kept upload: its bytes stand in the files folder under their hash. */
export interface StoredFile {
  id: string
  sha256: string
  type: string
  size: number
  ownerId: string | null
  createdAt: string
}

/** Adds one upload. */
export async function insertFile(db: Db, file: StoredFile): Promise<void> {
  await db('files').insert(file)
}

/** The upload with this id, or undefined. */
export async function findFile(db: Db, id: string): Promise<StoredFile | undefined> {
  return db<StoredFile>('files').where({ id }).first()
}

/** The holders, with their crews, of the credentials that show this file. */
export async function listHoldersOfFile(db: Db, fileId: string): Promise<{ personId: string, crewId: string | null }[]> {
  return db('credentials').join('people', 'people.id', 'credentials.personId').where({ fileId }).select('people.id as personId', 'people.crewId')
}
