import type { TypeView } from '#shared/schemas/requirements'
import { toValidity } from './clearance-facts'
import type { Db } from './database'

/** Every credential type by its code. */
export async function listTypes(db: Db): Promise<TypeView[]> {
  const rows = await db('credentialTypes').orderBy('code').select('id', 'code', 'nameEn', 'nameEs', 'validityKind', 'months', 'anchor', 'basis', 'leadDays', 'perSite', 'source', 'module')
  return rows.map(row => ({
    id: row.id, code: row.code, name: { en: row.nameEn, es: row.nameEs }, validity: toValidity(row), basis: row.basis,
    leadDays: row.leadDays, perSite: row.perSite === 1, source: row.source, module: row.module,
  }))
}

function toRow({ name, validity, ...rest }: Partial<TypeView>) {
  return {
    ...rest,
    ...(name && { nameEn: name.en, nameEs: name.es }),
    ...(validity && { validityKind: validity.kind, months: validity.months ?? null, anchor: validity.anchor ?? null }),
  }
}

/** Adds a type. */
export async function insertType(db: Db, type: TypeView, now: string): Promise<void> {
  await db('credentialTypes').insert({ ...toRow(type), createdAt: now })
}

/** Changes a type. Credentials that were issued before keep their dates. */
export async function updateType(db: Db, id: string, changes: Partial<TypeView>): Promise<void> {
  if (Object.keys(changes).length > 0) await db('credentialTypes').where({ id }).update(toRow(changes))
}
