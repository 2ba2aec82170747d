import type { Db } from './database'

export type CompanyTextKind = 'talk' | 'moduleNote'

/** One saved version of a company's text; `data` is what its kind's schema says. */
export interface CompanyText { id: string, kind: CompanyTextKind, slug: string, version: number, data: unknown, isRetired: boolean, savedBy: string, savedAt: string }
type Row = Omit<CompanyText, 'data' | 'isRetired'> & { data: string, isRetired: 0 | 1 }

const toText = (row: Row): CompanyText => ({ ...row, data: JSON.parse(row.data) as unknown, isRetired: row.isRetired === 1 })

/** The newest version of each text of a kind, or every version with `'all'`; by slug and version. */
export async function listCompanyTexts(db: Db, kind: CompanyTextKind, which: 'newest' | 'all'): Promise<CompanyText[]> {
  const rows: Row[] = await db('companyTexts as t').where({ kind }).modify(query => which === 'newest' && query.whereRaw('t.version = (select max(version) from company_texts o where o.kind = t.kind and o.slug = t.slug)')).orderBy(['slug', 'version']).select('t.*')
  return rows.map(toText)
}

/** One version of a text, the newest unless said, or undefined. */
export async function findCompanyText(db: Db, kind: CompanyTextKind, slug: string, version?: number): Promise<CompanyText | undefined> {
  const row = await db<Row>('companyTexts').where({ kind, slug, ...(version !== undefined && { version }) }).orderBy('version', 'desc').first()
  return row && toText(row)
}

/** Who saved which version when, the newest first. */
export async function listVersions(db: Db, kind: CompanyTextKind, slug: string): Promise<{ version: number, savedAt: string, savedBy: string }[]> {
  return db('companyTexts').join('people', 'people.id', 'companyTexts.savedBy').where({ kind, slug }).orderBy('companyTexts.version', 'desc').select('companyTexts.version', 'savedAt', 'people.name as savedBy')
}

/** Saves a version; its number must be new. */
export async function insertCompanyText(db: Db, text: CompanyText): Promise<void> {
  await db('companyTexts').insert({ ...text, data: JSON.stringify(text.data) })
}
