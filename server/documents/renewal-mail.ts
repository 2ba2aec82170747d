import ical, { ICalCalendarMethod, ICalEventStatus } from 'ical-generator'
import type { Language } from '#shared/domain/states'

export type RenewalNews = 'invited' | 'changed' | 'waiting' | 'cancelled' | 'removed'
export interface RenewalSession { id: string, version: number, credential: string, site: string, place: string, trainer: string, startsAt: string, minutes: number, timeZone: string, link: string, note?: string | null }

const words = {
  en: {
    subject: { invited: (credential: string) => `Renewal booked: ${credential}`, changed: (credential: string) => `Changed: renewal of ${credential}`, waiting: (credential: string) => `On the waiting list: ${credential}`, cancelled: (credential: string) => `Cancelled: renewal of ${credential}`, removed: (credential: string) => `No longer booked: ${credential}` },
    first: { invited: 'You have a seat in this session:', changed: 'This session has changed. It is now:', waiting: 'All seats are taken. You are on the waiting list and hear when one is free:', cancelled: 'This session does not take place:', removed: 'You no longer have a seat in this session:' },
    when: 'When', where: 'Where', trainer: 'Trainer', minutes: (count: number) => `${count} minutes`, paid: 'Required training is working time.', see: 'Your cards:',
  },
  es: {
    subject: { invited: (credential: string) => `Renovación programada: ${credential}`, changed: (credential: string) => `Cambió: renovación de ${credential}`, waiting: (credential: string) => `En lista de espera: ${credential}`, cancelled: (credential: string) => `Cancelada: renovación de ${credential}`, removed: (credential: string) => `Ya no tiene lugar: ${credential}` },
    first: { invited: 'Usted tiene lugar en esta sesión:', changed: 'Esta sesión cambió. Ahora es:', waiting: 'No quedan lugares. Está en la lista de espera y le avisamos cuando haya uno:', cancelled: 'Esta sesión no se hace:', removed: 'Ya no tiene lugar en esta sesión:' },
    when: 'Cuándo', where: 'Dónde', trainer: 'Instructor', minutes: (count: number) => `${count} minutos`, paid: 'La capacitación obligatoria es tiempo de trabajo.', see: 'Sus credenciales:',
  },
}

const moment = (instant: string, timeZone: string, language: Language) => new Intl.DateTimeFormat(language === 'es' ? 'es-US' : 'en-US', { dateStyle: 'full', timeStyle: 'short', timeZone }).format(new Date(instant)).replace(/\s/g, ' ')

/**
 * The session as a calendar entry (RFC 5545) under an id that stays the same: a later one with a higher sequence takes
 * its place, a cancelled one takes it away.
 */
export function renewalEntry(session: RenewalSession, { language, now, isOff }: { language: Language, now: string, isOff: boolean }): string {
  const said = words[language]
  const calendar = ical({ prodId: { company: 'Pourwright', product: 'Renewals', language: language.toUpperCase() }, method: isOff ? ICalCalendarMethod.CANCEL : ICalCalendarMethod.PUBLISH })
  calendar.createEvent({
    id: `renewal-${session.id}@pourwright`, sequence: session.version, stamp: now, start: session.startsAt, end: new Date(Date.parse(session.startsAt) + session.minutes * 60_000).toISOString(),
    summary: said.subject[isOff ? 'cancelled' : 'invited'](session.credential), location: `${session.place}, ${session.site}`, description: `${said.trainer}: ${session.trainer}`,
    ...(isOff && { status: ICalEventStatus.CANCELLED }),
  })
  return calendar.toString()
}

/** The message about a session in the reader's language, with its calendar entry; none for who only waits. */
export function renewalMail(session: RenewalSession, { news, name, language, now }: { news: RenewalNews, name: string, language: Language, now: string }) {
  const said = words[language]
  const isOff = news === 'cancelled' || news === 'removed'
  const body = [
    language === 'es' ? `${name}:` : `${name},`, '', said.first[news], '', session.credential, `${said.when}: ${moment(session.startsAt, session.timeZone, language)} (${said.minutes(session.minutes)})`,
    `${said.where}: ${session.place}, ${session.site}`, `${said.trainer}: ${session.trainer}`, ...(session.note ? ['', session.note] : []), '', said.paid, `${said.see} ${session.link}`,
  ].join('\n')
  return { subject: said.subject[news](session.credential), body, ...(news !== 'waiting' && { calendar: renewalEntry(session, { language, now, isOff }) }) }
}
