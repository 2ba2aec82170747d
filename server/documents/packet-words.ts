import type { Language } from '#shared/domain/states'

/** The words of a packet on paper. */
export const packetWords = {
  en: {
    title: (site: string) => `Site packet: ${site}`, made: (date: string, by: string) => `As it stood on ${date}. Made by ${by}.`,
    note: 'Company record, not a licence. It says what this company recorded; an outside licence or certificate is shown by its holder. The local code, the form maker and the competent person on site come first.',
    foot: 'Company record, not a licence', people: (count: number) => (count === 1 ? '1 person' : `${count} people`), columns: ['Name', 'Employer, trade', 'Crew', 'Cleared for'], until: (date: string) => `until ${date}`, nothing: 'no duty',
    credentials: 'Credentials in date', cardColumns: ['Name', 'Credential', 'Basis', 'Issuer', 'Issued', 'Expires'], noExpiry: 'no expiry', basis: { law: 'law', issuer: 'issuer', site: 'site', company: 'company' },
    sheets: (count: number) => `The last ${count} sealed briefing sheets`, sheetColumns: ['Date', 'Talk', 'Given by', 'Signed', 'Check it at'], hash: 'SHA-256 of this packet\'s contents',
  },
  es: {
    title: (site: string) => `Expediente de la obra: ${site}`, made: (date: string, by: string) => `Como estaba el ${date}. Lo hizo ${by}.`,
    note: 'Registro de la empresa, no es una licencia. Dice lo que esta empresa registró; la licencia o el certificado de afuera lo muestra su titular. Primero van el código local, el fabricante del molde y la persona competente de la obra.',
    foot: 'Registro de la empresa, no es una licencia', people: (count: number) => (count === 1 ? '1 persona' : `${count} personas`), columns: ['Nombre', 'Empresa, oficio', 'Cuadrilla', 'Puede hacer'], until: (date: string) => `hasta ${date}`, nothing: 'ninguna tarea',
    credentials: 'Credenciales vigentes', cardColumns: ['Nombre', 'Credencial', 'Base', 'Emisor', 'Emitida', 'Vence'], noExpiry: 'no vence', basis: { law: 'ley', issuer: 'emisor', site: 'obra', company: 'empresa' },
    sheets: (count: number) => `Las últimas ${count} hojas selladas`, sheetColumns: ['Fecha', 'Plática', 'La dio', 'Firmas', 'Revísela en'], hash: 'SHA-256 del contenido de este expediente',
  },
} as const satisfies Record<Language, unknown>
