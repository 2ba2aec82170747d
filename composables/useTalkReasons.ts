import type { SuggestionView } from '#shared/schemas/talk'

/** Why a talk is suggested, as one sentence; a talk just given says so instead. */
export function useTalkReasons() {
  const { t } = useI18n()
  const { formatShortDate } = useDates()

  function words(reason: SuggestionView['reasons'][number]): string {
    switch (reason.kind) {
      case 'work': return t('briefing.reason.work', { tags: reason.tags.map(tag => t(`briefing.tag.${tag}`)).join(', ') })
      case 'weather': return t('briefing.reason.weather', { tags: reason.tags.map(tag => t(`briefing.hazard.${tag}`)).join(', ') })
      case 'nearMiss': return t(reason.isHere ? 'briefing.reason.nearMissHere' : 'briefing.reason.nearMiss', { date: formatShortDate(reason.date) })
      case 'notLately': return t('briefing.reason.notLately', { days: reason.days })
      case 'justGiven': return reason.days === 0 ? t('briefing.reason.justGivenToday') : t('briefing.reason.justGiven', { days: reason.days })
      default: return t(`briefing.reason.${reason.kind}`)
    }
  }
  function becauseOf(talk: Pick<SuggestionView, 'reasons'>): string {
    const given = talk.reasons.find(reason => reason.kind === 'justGiven')
    if (given) return `${words(given)}.`
    return talk.reasons.length > 0 ? `${t('briefing.today.because')} ${talk.reasons.map(words).join('; ')}.` : ''
  }
  return { becauseOf }
}
