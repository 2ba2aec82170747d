import { badField } from '../refusal'
import type { Table } from './read-table'

/** A row by field; `surplus` when it has more cells than the header names. */
export interface NamedRow { number: number, values: Record<string, string>, surplus: boolean }

/** Field → how people head it, in both languages. */
export type Synonyms = Record<string, readonly string[]>

export const peopleColumns: Synonyms = {
  name: ['name', 'full name', 'employee', 'employee name', 'person', 'nombre', 'nombre completo', 'persona', 'empleado'],
  badge: ['badge', 'badge number', 'badge no', 'employee id', 'id', 'number', 'gafete', 'número de gafete', 'numero', 'número'],
  email: ['email', 'e-mail', 'mail', 'email address', 'correo', 'correo electrónico'],
  phone: ['phone', 'mobile', 'cell', 'telephone', 'teléfono', 'celular'],
  role: ['role', 'rol', 'función'],
  language: ['language', 'lang', 'idioma'],
  employer: ['employer', 'company', 'empleador', 'empresa', 'compañía'],
  employerKind: ['employer kind', 'employerKind', 'kind', 'tipo de empleador'],
  trade: ['trade', 'craft', 'oficio'],
  hiredOn: ['hired on', 'hired', 'hire date', 'start date', 'hiredOn', 'fecha de entrada', 'entrada', 'fecha de contratación'],
  leftOn: ['left on', 'left', 'end date', 'leftOn', 'fecha de salida', 'salida'],
  crew: ['crew', 'team', 'cuadrilla'],
}

export const credentialColumns: Synonyms = {
  badge: ['badge', 'badge number', 'badge no', 'employee id', 'gafete', 'número de gafete'],
  email: ['email', 'e-mail', 'correo', 'correo electrónico'],
  type: ['type', 'credential', 'card', 'certificate', 'certification', 'training', 'tipo', 'credencial', 'tarjeta', 'certificado'],
  issuedOn: ['issued on', 'issued', 'issue date', 'date', 'issuedOn', 'date of issue', 'emitida el', 'fecha de emisión', 'fecha'],
  expiresOn: ['expires on', 'expires', 'expiry', 'expiry date', 'expiration', 'expiration date', 'expiresOn', 'vence', 'vence el', 'vencimiento', 'fecha de vencimiento'],
  number: ['number', 'card number', 'certificate number', 'no', 'número', 'número de tarjeta'],
  issuer: ['issuer', 'issued by', 'provider', 'emitida por', 'emisor'],
  site: ['site', 'site code', 'obra', 'código de la obra'],
}

/** Letters and digits only, without accents: "Número de gafete:" and "numero_de_gafete" are one. */
const plain = (text: string) => text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase().replace(/[^a-z0-9]/g, '')

/** Which column is which field; null for a column that is not used. Throws 422 when a needed field has no column or one has two. */
export function mapColumns(header: readonly string[], synonyms: Synonyms, needed: readonly (readonly string[])[]): { header: string, field: string | null }[] {
  const known = new Map(Object.entries(synonyms).flatMap(([field, names]) => [field, ...names].map(name => [plain(name), field] as const)))
  const mapping = header.map(name => ({ header: name, field: known.get(plain(name)) ?? null }))
  const fields = mapping.map(column => column.field).filter(field => field !== null)
  const double = fields.find((field, index) => fields.indexOf(field) !== index)
  if (double) throw badField('file', `two columns for ${double}`, 'doubleColumn')
  const gap = needed.find(choices => !choices.some(choice => fields.includes(choice)))
  if (gap) throw badField('file', `no column for ${gap.join(' or ')}`, 'missingColumn')
  return mapping
}

/** The rows by field. Empty cells are left out, so that they change nothing. */
export function nameCells(table: Table, mapping: readonly { field: string | null }[]): NamedRow[] {
  return table.rows.map(({ number, cells }) => ({
    number,
    surplus: cells.slice(mapping.length).some(cell => cell !== ''),
    values: Object.fromEntries(mapping.flatMap(({ field }, index) => (field && cells[index] ? [[field, cells[index]]] : []))),
  }))
}
