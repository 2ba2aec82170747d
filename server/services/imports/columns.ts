import { Refusal } from '../refusal'
import type { FileRow } from './read-table'

/** A row by field; `surplus` when it has more cells than the header names. */
export interface NamedRow { number: number, values: Record<string, string>, surplus: boolean }
/** A column of the file and the field it was taken for; null when it is not used. */
export interface Column { header: string, field: string | null }

/** Field → how people head it, in both languages. */
export type Synonyms = Record<string, readonly string[]>

export const peopleColumns: Synonyms = {
  name: ['name', 'full name', 'employee', 'employee name', 'worker', 'person', 'nombre', 'nombre completo', 'persona', 'empleado', 'trabajador'],
  firstName: ['first name', 'given name', 'first', 'nombres', 'primer nombre'],
  lastName: ['last name', 'surname', 'family name', 'last', 'apellido', 'apellidos'],
  badge: ['badge', 'badge number', 'badge no', 'employee id', 'employee number', 'id', 'number', 'gafete', 'número de gafete', 'numero', 'número', 'número de empleado'],
  email: ['email', 'e-mail', 'mail', 'email address', 'correo', 'correo electrónico'],
  phone: ['phone', 'phone number', 'mobile', 'mobile phone', 'cell', 'cell phone', 'telephone', 'teléfono', 'celular', 'móvil', 'teléfono móvil', 'teléfono celular', 'número de teléfono'],
  role: ['role', 'rol', 'función'],
  language: ['language', 'lang', 'preferred language', 'idioma', 'lengua'],
  employer: ['employer', 'company', 'empleador', 'empresa', 'compañía'],
  employerKind: ['employer kind', 'employerKind', 'kind', 'tipo de empleador'],
  trade: ['trade', 'craft', 'oficio'],
  hiredOn: ['hired on', 'hired', 'hire date', 'date hired', 'date of hire', 'start date', 'hiredOn', 'fecha de entrada', 'entrada', 'fecha de ingreso', 'fecha de contratación'],
  leftOn: ['left on', 'left', 'end date', 'termination date', 'leftOn', 'fecha de salida', 'salida', 'baja'],
  crew: ['crew', 'team', 'cuadrilla'],
}

export const credentialColumns: Synonyms = {
  badge: ['badge', 'badge number', 'badge no', 'employee id', 'employee number', 'gafete', 'número de gafete', 'número de empleado'],
  email: ['email', 'e-mail', 'email address', 'correo', 'correo electrónico'],
  type: ['type', 'credential', 'card', 'certificate', 'certification', 'training', 'course', 'tipo', 'credencial', 'tarjeta', 'certificado', 'curso'],
  issuedOn: ['issued on', 'issued', 'issue date', 'date', 'issuedOn', 'date of issue', 'completed', 'completion date', 'emitida el', 'fecha de emisión', 'fecha'],
  expiresOn: ['expires on', 'expires', 'expiry', 'expiry date', 'expiration', 'expiration date', 'valid until', 'expiresOn', 'vence', 'vence el', 'vencimiento', 'fecha de vencimiento'],
  number: ['number', 'card number', 'certificate number', 'no', 'número', 'número de tarjeta'],
  issuer: ['issuer', 'issued by', 'provider', 'emitida por', 'emisor'],
  site: ['site', 'site code', 'obra', 'código de la obra'],
}

/** Letters and digits only, without accents: "Número de gafete:" and "numero_de_gafete" are one. */
export const plainHeader = (text: string) => text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase().replace(/[^a-z0-9]/g, '')

/** Rows above the header (a title, a date of printing) that are looked past. */
const mostTitleRows = 10

/** What the columns of a file may mean: what was chosen for this file first, then what was chosen before, then the usual words. */
export interface Meanings { synonyms: Synonyms, needed: readonly (readonly string[])[], chosen: ReadonlyMap<string, string | null> }

/** The header with what each column was taken for, and the rows under it. */
export interface MappedTable { mapping: Column[], rows: FileRow[] }

function toColumns(cells: readonly string[], { synonyms, chosen }: Meanings): Column[] {
  const known = new Map(Object.entries(synonyms).flatMap(([field, names]) => [field, ...names].map(name => [plainHeader(name), field] as const)))
  return cells.map((header) => {
    const plain = plainHeader(header)
    const field = chosen.has(plain) ? chosen.get(plain)! : known.get(plain) ?? null
    return { header, field: field !== null && field in synonyms ? field : null }
  })
}

/**
 * Finds the header (the first of the top rows in which most columns are known; the first row when none has two) and
 * says which column is which field. Throws 422 with the mapping in `data` when a needed field has no column or one has
 * two, so that whoever sends it can say which is which.
 */
export function mapColumns(rows: readonly FileRow[], meanings: Meanings): MappedTable {
  const heads = rows.slice(0, mostTitleRows).map(row => toColumns(row.cells, meanings))
  const counts = heads.map(columns => columns.filter(column => column.field !== null).length)
  const most = Math.max(...counts)
  const at = most < 2 ? 0 : counts.indexOf(most)
  const mapping = heads[at]!
  const fields = mapping.map(column => column.field).filter(field => field !== null)
  const refuse = (code: string, message: string) => new Refusal('unprocessable', code, { message, fields: { file: message }, data: { mapping, example: rows[at + 1]?.cells ?? [] } })
  if (rows.length === at + 1) throw refuse('emptyFile', 'has no rows under its header')
  const double = fields.find((field, index) => fields.indexOf(field) !== index)
  if (double) throw refuse('doubleColumn', `two columns for ${double}`)
  const gap = meanings.needed.find(choices => !choices.some(choice => fields.includes(choice)))
  if (gap) throw refuse('missingColumn', `no column for ${gap.join(' or ')}`)
  return { mapping, rows: rows.slice(at + 1) }
}

/** The rows by field. Empty cells are left out, so that they change nothing; first and last name make the name. */
export function nameCells({ mapping, rows }: MappedTable): NamedRow[] {
  return rows.map(({ number, cells }) => {
    const { firstName, lastName, ...values } = Object.fromEntries(mapping.flatMap(({ field }, index) => (field && cells[index] ? [[field, cells[index]]] : [])))
    const joined = [firstName, lastName].filter(part => part !== undefined).join(' ')
    return { number, surplus: cells.slice(mapping.length).some(cell => cell !== ''), values: joined && !values.name ? { ...values, name: joined } : values }
  })
}
