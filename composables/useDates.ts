/** Dates as people say them, in the reader's language: "Tue, Dec 1", with the year when it is not this one. */
export function useDates() {
  const { locale } = useI18n()
  const tag = computed(() => (locale.value === 'es' ? 'es-US' : 'en-US'))

  /** A calendar date. `thisYear` (YYYY) leaves the year out where it is the same. */
  function formatDate(date: string | null | undefined, thisYear?: string): string {
    if (!date) return ''
    const year = date.slice(0, 4) === thisYear ? undefined : 'numeric'
    return new Intl.DateTimeFormat(tag.value, { weekday: 'short', month: 'short', day: 'numeric', year, timeZone: 'UTC' }).format(new Date(`${date}T12:00:00Z`))
  }
  /** A calendar date without its weekday. */
  function formatShortDate(date: string | null | undefined): string {
    if (!date) return ''
    return new Intl.DateTimeFormat(tag.value, { month: 'short', day: 'numeric', timeZone: 'UTC' }).format(new Date(`${date}T12:00:00Z`))
  }
  /** The time of an instant in a zone: "6:42 am". */
  function formatTime(instant: string | null | undefined, timeZone: string): string {
    if (!instant) return ''
    return new Intl.DateTimeFormat(tag.value, { hour: 'numeric', minute: '2-digit', timeZone }).format(new Date(instant)).replace(/\s/g, ' ').toLowerCase()
  }
  /** Date and time of an instant in a zone. */
  function formatInstant(instant: string | null | undefined, timeZone: string): string {
    if (!instant) return ''
    return new Intl.DateTimeFormat(tag.value, { dateStyle: 'medium', timeStyle: 'short', timeZone }).format(new Date(instant))
  }
  return { formatDate, formatShortDate, formatTime, formatInstant }
}
