import type { Db } from '../database'

interface Bilingual { en: string, es: string }

/** Names that screens put in place of codes: duties and credential types by code, crews by id. */
export async function mapNames(db: Db): Promise<{ duties: Record<string, Bilingual>, types: Record<string, Bilingual>, crews: Map<string, string> }> {
  const toNames = (rows: { code: string, nameEn: string, nameEs: string }[]) => Object.fromEntries(rows.map(row => [row.code, { en: row.nameEn, es: row.nameEs }]))
  const duties = toNames(await db('duties').orderBy('position').select('code', 'nameEn', 'nameEs'))
  const types = toNames(await db('credentialTypes').orderBy('code').select('code', 'nameEn', 'nameEs'))
  const crews = new Map<string, string>((await db('crews').select('id', 'name')).map(row => [row.id, row.name]))
  return { duties, types, crews }
}

/** The name of each site by its id. */
export async function mapSiteNames(db: Db): Promise<Map<string, string>> {
  return new Map((await db('sites').select('id', 'name')).map(row => [row.id, row.name]))
}
