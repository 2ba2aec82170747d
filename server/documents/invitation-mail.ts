import type { Language } from '#shared/domain/states'

interface Parts { name: string, lines: readonly { title: string, link: string }[] }

const words = {
  en: { subject: 'Modules to take for the coming work', body: ({ name, lines }: Parts) => `${name},\n\nFor the coming work you need:\n\n${lines.map(line => `${line.title}\n${line.link}`).join('\n\n')}\n\nRequired training is working time.\n` },
  es: { subject: 'Módulos para el trabajo que viene', body: ({ name, lines }: Parts) => `${name}:\n\nPara el trabajo que viene usted necesita:\n\n${lines.map(line => `${line.title}\n${line.link}`).join('\n\n')}\n\nLa capacitación obligatoria es tiempo de trabajo.\n` },
}

/** The message that invites somebody to modules, in their language. */
export const invitationMail = (language: Language, parts: Parts) => ({ subject: words[language].subject, body: words[language].body(parts) })
