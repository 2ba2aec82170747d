import type { CredentialState, Language, ValidityBasis } from '#shared/domain/states'

/** The words of exported lists, cards, calendars and reminders; screens have theirs in `i18n/`. */
export interface CredentialWords {
  columns: { person: string, badge: string, employer: string, crew: string, credential: string, number: string, issuer: string, issuedOn: string, expiresOn: string, daysLeft: string, state: string }
  states: Record<CredentialState, string>
  basis: Record<ValidityBasis, string>
  fileName: string
  title: string
  madeOn: (date: string) => string
  count: (count: number) => string
  noExpiry: string
  runsOut: (credential: string, person: string) => string
  runsOutSoon: (credential: string, person: string) => string
  companyRecord: string
  checkAt: string
  code: string
  card: string
}

const en: CredentialWords = {
  columns: { person: 'Person', badge: 'Badge', employer: 'Employer', crew: 'Crew', credential: 'Credential', number: 'Number', issuer: 'Issuer', issuedOn: 'Issued on', expiresOn: 'Expires on', daysLeft: 'Days left', state: 'State' },
  states: { inDate: 'in date', dueSoon: 'due soon', expired: 'expired', unverified: 'not verified', withdrawn: 'withdrawn', notYet: 'not yet valid', rejected: 'rejected' },
  basis: { law: 'law', issuer: 'issuer', site: 'site', company: 'company rule' },
  fileName: 'credentials',
  title: 'Credentials',
  madeOn: date => `State on ${date}`,
  count: count => `${count} in all`,
  noExpiry: 'No expiry',
  runsOut: (credential, person) => `${credential} expires: ${person}`,
  runsOutSoon: (credential, person) => `In 30 days: ${credential}, ${person}`,
  companyRecord: 'Company record, not a licence',
  checkAt: 'Check this card:',
  code: 'Code',
  card: 'Training card',
}

const es: CredentialWords = {
  columns: { person: 'Persona', badge: 'Número de gafete', employer: 'Empleador', crew: 'Cuadrilla', credential: 'Credencial', number: 'Número', issuer: 'Emitida por', issuedOn: 'Emitida el', expiresOn: 'Vence el', daysLeft: 'Días restantes', state: 'Estado' },
  states: { inDate: 'vigente', dueSoon: 'por vencer', expired: 'vencida', unverified: 'sin verificar', withdrawn: 'retirada', notYet: 'todavía no vale', rejected: 'rechazada' },
  basis: { law: 'ley', issuer: 'emisor', site: 'obra', company: 'regla de la empresa' },
  fileName: 'credenciales',
  title: 'Credenciales',
  madeOn: date => `Estado al ${date}`,
  count: count => `${count} en total`,
  noExpiry: 'No vence',
  runsOut: (credential, person) => `Vence ${credential}: ${person}`,
  runsOutSoon: (credential, person) => `En 30 días: ${credential}, ${person}`,
  companyRecord: 'Registro de la empresa, no es una licencia',
  checkAt: 'Revise esta tarjeta:',
  code: 'Código',
  card: 'Tarjeta de capacitación',
}

export const credentialWords: Record<Language, CredentialWords> = { en, es }
