import type { Bilingual } from '#shared/domain/states'

/** How a list speaks of names and of the days that are left. */
export function useCredentialWords() {
  const { t, locale } = useI18n()
  const nameOf = (name: Bilingual) => (locale.value === 'es' ? name.es : name.en)
  /** "3 days ago", "today", "14 days"; empty without an expiry. */
  function daysText(days: number | null): string {
    if (days === null) return ''
    return days < 0 ? t('credentials.daysAgo', -days) : t('credentials.daysLeft', days)
  }
  return { nameOf, daysText }
}
