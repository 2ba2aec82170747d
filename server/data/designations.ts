import type { DesignationView } from '#shared/schemas/requirements'
import type { Db } from './database'

const columns = ['designations.id', 'designations.personId', 'people.name', 'designations.kind', 'designations.subject', 'designations.siteId', 'designations.authority', 'designations.startsOn as from', 'designations.endsOn as to']

/** Designations with their person's name, ended ones too, by name. */
export async function listDesignations(db: Db, id?: string): Promise<DesignationView[]> {
  return db('designations').join('people', 'people.id', 'designations.personId').modify(query => id !== undefined && query.where('designations.id', id))
    .orderBy(['people.sortName', 'designations.subject', 'designations.id']).select(...columns)
}

type DesignationRow = Omit<DesignationView, 'name'>
const toRow = ({ from, to, ...rest }: DesignationRow) => ({ ...rest, startsOn: from, endsOn: to })

/** Adds a designation. */
export async function insertDesignation(db: Db, designation: DesignationRow, now: string): Promise<void> {
  await db('designations').insert({ ...toRow(designation), createdAt: now })
}

/** Writes a designation anew. */
export async function updateDesignation(db: Db, designation: DesignationRow): Promise<void> {
  await db('designations').where({ id: designation.id }).update(toRow(designation))
}
