import type { Language } from '#shared/domain/states'

interface Asked { asker: string, module: string, question: string, link: string }
interface Answered { trainer: string, question: string, answer: string, link: string }

const asked = {
  en: { subject: ({ asker, module }: Asked) => `${asker} asks you about ${module}`, body: ({ asker, question, link }: Asked) => `${asker} asks:\n\n${question}\n\nAnswer it here:\n${link}\n` },
  es: { subject: ({ asker, module }: Asked) => `${asker} le pregunta sobre ${module}`, body: ({ asker, question, link }: Asked) => `${asker} pregunta:\n\n${question}\n\nConteste aquí:\n${link}\n` },
}
const answered = {
  en: { subject: ({ trainer }: Answered) => `${trainer} answered your question`, body: ({ question, answer, link }: Answered) => `You asked:\n\n${question}\n\nThe answer:\n\n${answer}\n\nIt is kept here:\n${link}\n` },
  es: { subject: ({ trainer }: Answered) => `${trainer} contestó su pregunta`, body: ({ question, answer, link }: Answered) => `Usted preguntó:\n\n${question}\n\nLa respuesta:\n\n${answer}\n\nQueda guardada aquí:\n${link}\n` },
}

/** The message that carries a learner's question to a trainer, in the trainer's language. */
export const questionMail = (language: Language, parts: Asked) => ({ subject: asked[language].subject(parts), body: asked[language].body(parts) })

/** The message that carries the answer back, in the learner's language. */
export const answeredMail = (language: Language, parts: Answered) => ({ subject: answered[language].subject(parts), body: answered[language].body(parts) })
