import type { Language } from '#shared/domain/states'

interface Given { company: string, site: string, endsOn: string, by: string, url: string }
const words: Record<Language, (given: Given) => { subject: string, body: string }> = {
  en: ({ company, site, endsOn, by, url }) => ({ subject: `${company}: site packet for ${site}`, body: `${by} of ${company} shares the site packet for ${site}: people, what they are cleared for, credentials in date and the last briefing sheets.\n\n${url}\n\nThe link works until ${endsOn} and notes each time it is opened. Company record, not a licence.` }),
  es: ({ company, site, endsOn, by, url }) => ({ subject: `${company}: expediente de la obra ${site}`, body: `${by}, de ${company}, comparte el expediente de la obra ${site}: personas, qué pueden hacer, credenciales vigentes y las últimas hojas de plática.\n\n${url}\n\nEl enlace sirve hasta el ${endsOn} y anota cada vez que se abre. Registro de la empresa, no es una licencia.` }),
}

/** The mail that hands a packet's link over. */
export const packetMail = (language: Language, given: Given) => words[language](given)
