import ical, { ICalAlarmType } from 'ical-generator'
import type { Language } from '#shared/domain/states'
import type { CredentialItem } from '#shared/schemas/credentials'
import { credentialWords } from './credential-words'

const thirtyDays = 30 * 24 * 60 * 60

interface CalendarOptions {
  language: Language
  company: string
  /** This moment, ISO instant. */
  now: string
  /** How often each credential changed, so that calendars replace their copy. */
  versions: ReadonlyMap<string, number>
}

/**
 * A calendar (RFC 5545) with one all-day event on the last good day of each credential that has one, under an id
 * that stays the same, with a reminder 30 days before. Dates are given as text: a local Date would shift the day.
 */
export function renewalCalendar(items: CredentialItem[], { language, company, now, versions }: CalendarOptions): string {
  const words = credentialWords[language]
  const calendar = ical({ name: `${company}: ${words.title}`, prodId: { company: 'Pourwright', product: 'Credentials', language: language.toUpperCase() } })
  for (const item of items) {
    if (item.expiresOn === null) continue
    const credential = item.typeName[language]
    const event = calendar.createEvent({
      id: `credential-${item.id}@pourwright`,
      start: item.expiresOn,
      allDay: true,
      stamp: now,
      sequence: (versions.get(item.id) ?? 1) - 1,
      summary: words.runsOut(credential, item.person),
      description: [words.states[item.state], `${words.columns.employer}: ${item.employer}`, item.source].join('\n'),
    })
    event.createAlarm({ type: ICalAlarmType.display, triggerBefore: thirtyDays, description: words.runsOutSoon(credential, item.person) })
  }
  return calendar.toString()
}
