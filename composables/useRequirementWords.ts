import type { DutyView, RuleView, TypeView } from '#shared/schemas/requirements'

/** Rules and validities in words: "Pump and hose and Blowout response", "36 months, from the day". */
export function useRequirementWords(duties: () => readonly DutyView[], types: () => readonly TypeView[], sites: () => readonly { id: string, name: string }[]) {
  const { t, locale } = useI18n()
  const inLanguage = (name: { en: string, es: string } | undefined, code: string) => name?.[locale.value === 'es' ? 'es' : 'en'] ?? code
  const typeName = (code: string) => inLanguage(types().find(type => type.code === code)?.name, code)
  const dutyName = (code: string) => inLanguage(duties().find(duty => duty.code === code)?.name, code)
  const siteName = (id: string) => sites().find(site => site.id === id)?.name ?? id

  const groupsText = (groups: readonly (readonly string[])[]) => groups.map(group => group.map(typeName).join(` ${t('requirements.or')} `)).join(` ${t('requirements.and')} `)
  function appliesText({ appliesTo }: Pick<RuleView, 'appliesTo'>): string {
    if (appliesTo.duty && appliesTo.site) return t('requirements.dutyAtSite', { duty: dutyName(appliesTo.duty), site: siteName(appliesTo.site) })
    if (appliesTo.duty) return dutyName(appliesTo.duty)
    return appliesTo.site ? siteName(appliesTo.site) : t('requirements.everybody')
  }
  function validityText({ validity }: Pick<TypeView, 'validity'>): string {
    if (validity.kind !== 'period') return t(`requirements.validity.${validity.kind}`)
    return t(validity.anchor === 'monthEnd' ? 'requirements.validity.monthEnd' : 'requirements.validity.period', { months: validity.months })
  }
  return { typeName, dutyName, siteName, groupsText, appliesText, validityText }
}
