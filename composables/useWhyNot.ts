import type { CredentialState } from '#shared/domain/states'
import type { TodayPerson, TodayView } from '#shared/schemas/today'

type Duty = TodayPerson['stops'][number]
const markOf: Partial<Record<string, CredentialState>> = { expired: 'expired', notVerified: 'unverified', withdrawn: 'withdrawn', onHold: 'withdrawn', rejected: 'rejected' }

/** What stops somebody, in words: the reason, the nearest fix, and the mark that goes with it. */
export function useWhyNot(names: () => Pick<TodayView, 'dutyNames' | 'typeNames'>) {
  const { t, locale } = useI18n()
  const { formatShortDate } = useDates()
  const inLanguage = (name: { en: string, es: string } | undefined, code: string) => name?.[locale.value === 'es' ? 'es' : 'en'] ?? code
  const dutyName = (code: string) => inLanguage(names().dutyNames[code], code)
  const typeName = (code: string | undefined) => (code ? inLanguage(names().typeNames[code], code) : '')

  function fixWords(fix: Duty['missing'][number]['fix']): string {
    const minutes = 'minutes' in fix && typeof fix.minutes === 'number' ? fix.minutes : null
    return fix.kind === 'module' && minutes ? t('briefing.fixKind.moduleMinutes', { minutes }) : t(`briefing.fixKind.${fix.kind}`)
  }
  /** The first reason of a duty that is closed to somebody. */
  function whyWords(duty: Duty): { why: string, fix: string, mark: CredentialState | 'learning' } {
    const [missing] = duty.missing
    if (!missing) return { why: '', fix: '', mark: 'notYet' }
    const type = typeName(missing.why.type ?? missing.anyOf[0])
    const why = t(duty.state === 'learning' ? 'briefing.why.learning' : `briefing.why.${missing.why.kind}`, { type, date: formatShortDate(missing.why.on) })
    const isSaid = missing.fix.kind === 'safetyManager' || missing.fix.kind === 'office' || duty.state === 'learning'
    return { why, fix: isSaid ? '' : fixWords(missing.fix), mark: duty.state === 'learning' ? 'learning' : markOf[missing.why.kind] ?? 'notYet' }
  }
  return { dutyName, typeName, whyWords }
}
