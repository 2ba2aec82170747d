import type { Language } from '#shared/domain/states'
import type { BriefingSheet } from '#shared/domain/sheet'

const words = {
  en: {
    subject: (site: string, date: string) => `Briefing sheet sealed: ${site}, ${date}`,
    signed: (count: number, absent: number) => `${count} signed, ${absent} of the crew expected did not.`,
    auto: 'Nobody sealed it, so the end of the day did.',
    clock: 'The server\'s clock was set by hand: this is a test or a demo.',
    keep: 'Keep this mail. It shows what the sheet said on the day it was sealed.',
    hash: 'Hash', talk: 'Talk', by: 'Given by', check: 'Check it',
  },
  es: {
    subject: (site: string, date: string) => `Hoja de plática sellada: ${site}, ${date}`,
    signed: (count: number, absent: number) => `Firmaron ${count}; ${absent} de los que se esperaban no firmaron.`,
    auto: 'Nadie la selló; se selló sola al terminar el día.',
    clock: 'El reloj del servidor se puso a mano: es una prueba o una demostración.',
    keep: 'Guarde este correo. Muestra lo que decía la hoja el día que se selló.',
    hash: 'Huella', talk: 'Plática', by: 'La dio', check: 'Revísela',
  },
} as const

/** The mail that takes a sheet's hash outside the database, in the manager's language. */
export function sealingMail(sheet: BriefingSheet, { hash, checkUrl, language }: { hash: string, checkUrl: string, language: Language }): { subject: string, body: string } {
  const say = words[language]
  const lines = [
    `${sheet.siteName} (${sheet.siteCode}), ${sheet.date}`,
    `${say.talk}: ${sheet.talk.title[language]}`,
    `${say.by}: ${sheet.speaker.name}`,
    say.signed(sheet.lines.length, sheet.absent.length),
    ...(sheet.isSealedByDayEnd ? [say.auto] : []),
    ...(sheet.isClockSet ? [say.clock] : []),
    '', `${say.hash}: ${hash}`, `${say.check}: ${checkUrl}`, '', say.keep,
  ]
  return { subject: say.subject(sheet.siteName, sheet.date), body: `${lines.join('\n')}\n` }
}
