import type { Role } from '#shared/domain/states'

/** What is told to all who hold a guarded role when somebody gets one. */
interface Granted { granter: string, name: string, role: Role, company: string }

const roleWords = {
  en: { worker: 'worker', foreman: 'foreman', superintendent: 'superintendent', safety: 'safety manager', admin: 'office admin' },
  es: { worker: 'trabajador/a', foreman: 'mayordomo', superintendent: 'superintendente', safety: 'encargado/a de seguridad', admin: 'oficina' },
}

const words = {
  en: {
    subject: ({ name, role }: Granted) => `${name} is now ${roleWords.en[role]}`,
    body: ({ granter, name, role, company }: Granted) => `${granter} gave ${name} the role "${roleWords.en[role]}" at ${company}.\n\nIf you did not expect this, look at the audit trail and change it back.\n`,
  },
  es: {
    subject: ({ name, role }: Granted) => `${name} ahora es ${roleWords.es[role]}`,
    body: ({ granter, name, role, company }: Granted) => `${granter} dio a ${name} el rol "${roleWords.es[role]}" en ${company}.\n\nSi usted no lo esperaba, revise el historial de cambios y regréselo a como estaba.\n`,
  },
}

/** Subject and plain-text body, in the reader's language. */
export const roleGrantedMail = (language: 'en' | 'es', granted: Granted) => ({ subject: words[language].subject(granted), body: words[language].body(granted) })
