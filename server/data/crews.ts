import type { Db } from './database'
import { dutiesByCrew } from './roster'

export interface Crew {
  id: string
  name: string
  foremanId: string | null
  foremanName: string | null
  /** People now employed in it. */
  people: number
  duties: { duty: string, count: number }[]
}

/** Every crew by name, with its usual slots; `today` decides who counts as employed. */
export async function listCrews(db: Db, today: string, id?: string): Promise<Crew[]> {
  const duties = await dutiesByCrew(db)
  const employed = db('people').where('hiredOn', '<=', today).where(query => query.whereNull('leftOn').orWhere('leftOn', '>', today)).whereNotNull('crewId').groupBy('crewId').select('crewId').count({ people: '*' }).as('employed')
  const rows: (Omit<Crew, 'people' | 'duties'> & { people: number | null })[] = await db('crews').leftJoin('people as foreman', 'foreman.id', 'crews.foremanId').leftJoin(employed, 'employed.crewId', 'crews.id')
    .modify(query => id !== undefined && query.where('crews.id', id)).orderBy(['crews.name', 'crews.id'])
    .select('crews.id', 'crews.name', 'crews.foremanId', 'foreman.name as foremanName', 'employed.people')
  return rows.map(row => ({ ...row, people: row.people ?? 0, duties: duties.get(row.id) ?? [] }))
}

/** True when another crew has this name. */
export async function isCrewNameTaken(db: Db, name: string, exceptId?: string): Promise<boolean> {
  return !!await db('crews').where({ name }).modify(query => exceptId !== undefined && query.whereNot({ id: exceptId })).first('id')
}

/** Adds a crew without slots. */
export async function insertCrew(db: Db, crew: { id: string, name: string, foremanId: string | null }, now: string): Promise<void> {
  await db('crews').insert({ ...crew, createdAt: now })
}

/** Changes a crew. */
export async function updateCrew(db: Db, id: string, changes: { name?: string, foremanId?: string | null }): Promise<void> {
  if (Object.keys(changes).length > 0) await db('crews').where({ id }).update(changes)
}

/** Replaces a crew's usual slots; the duties by their id. */
export async function replaceCrewDuties(db: Db, crewId: string, slots: { dutyId: string, count: number }[]): Promise<void> {
  await db('crewDuties').where({ crewId }).delete()
  if (slots.length > 0) await db('crewDuties').insert(slots.map(slot => ({ crewId, ...slot })))
}
