import type { Language } from '#shared/domain/states'
import enBriefing from '../../i18n/locales/en/briefing.json'
import enCommon from '../../i18n/locales/en/common.json'
import enNearMisses from '../../i18n/locales/en/near-misses.json'
import enPackets from '../../i18n/locales/en/packets.json'
import enPeople from '../../i18n/locales/en/people.json'
import enRecords from '../../i18n/locales/en/records.json'
import enRenewals from '../../i18n/locales/en/renewals.json'
import esBriefing from '../../i18n/locales/es/briefing.json'
import esCommon from '../../i18n/locales/es/common.json'
import esNearMisses from '../../i18n/locales/es/near-misses.json'
import esPackets from '../../i18n/locales/es/packets.json'
import esPeople from '../../i18n/locales/es/people.json'
import esRecords from '../../i18n/locales/es/records.json'
import esRenewals from '../../i18n/locales/es/renewals.json'

interface Messages { [key: string]: string | Messages }
const messages: Record<Language, Messages> = {
  en: { ...enCommon, ...enBriefing, ...enNearMisses, ...enPackets, ...enPeople, ...enRecords, ...enRenewals },
  es: { ...esCommon, ...esBriefing, ...esNearMisses, ...esPackets, ...esPeople, ...esRecords, ...esRenewals },
}

/** The words that a screen shows for a key, for files that leave the product; the key itself when there are none. */
export function screenWord(language: Language, key: string, values: Record<string, string | number> = {}): string {
  const found = key.split('.').reduce<string | Messages | undefined>((at, part) => (typeof at === 'object' ? at[part] : undefined), messages[language])
  return typeof found === 'string' ? found.replace(/\{(\w+)\}/g, (whole, name: string) => String(values[name] ?? whole)) : key
}
