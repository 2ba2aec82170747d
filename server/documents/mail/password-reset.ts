import type { Language } from '#shared/domain/states'

interface Words { subject: string, body: (parts: { name: string, link: string }) => string }

const words: Record<Language, Words> = {
  en: {
    subject: 'Pourwright: set a new password',
    body: ({ name, link }) => `${name},

Somebody asked for a new password for your Pourwright sign-in. To set one, open this link within one hour. It works once.

${link}

If it was not you, do nothing: your password stays as it is.
`,
  },
  es: {
    subject: 'Pourwright: elija una contraseña nueva',
    body: ({ name, link }) => `${name}:

Alguien pidió una contraseña nueva para entrar a Pourwright con su correo. Para elegirla, abra este enlace en la próxima hora. Sirve una sola vez.

${link}

Si no fue usted, no haga nada: su contraseña sigue igual.
`,
  },
}

/** The message that carries a password reset link, in the person's language. */
export function passwordResetMail(language: Language, parts: { name: string, link: string }): { subject: string, body: string } {
  return { subject: words[language].subject, body: words[language].body(parts) }
}
