import type { Db } from './database'

export interface StoredHold {
  id: string
  personId: string
  name: string
  crewId: string | null
  from: string
  to: string | null
  reason: string
}

/** Holds with their person's name, ended ones too, the newest first. */
export async function listHolds(db: Db, id?: string): Promise<StoredHold[]> {
  return db('holds').join('people', 'people.id', 'holds.personId').modify(query => id !== undefined && query.where('holds.id', id))
    .orderBy([{ column: 'holds.startsOn', order: 'desc' }, { column: 'holds.id' }])
    .select('holds.id', 'holds.personId', 'people.name', 'people.crewId', 'holds.startsOn as from', 'holds.endsOn as to', 'holds.reason')
}

/** Puts a person on hold. */
export async function insertHold(db: Db, hold: { id: string, personId: string, from: string, to: string | null, reason: string, createdBy: string }, now: string): Promise<void> {
  const { from, to, ...rest } = hold
  await db('holds').insert({ ...rest, startsOn: from, endsOn: to, createdAt: now })
}

/** Writes a hold's days and reason. */
export async function updateHold(db: Db, hold: { id: string, from: string, to: string | null, reason: string }): Promise<void> {
  await db('holds').where({ id: hold.id }).update({ startsOn: hold.from, endsOn: hold.to, reason: hold.reason })
}
