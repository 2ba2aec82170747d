import { sessionChanges, sessionView } from '#shared/schemas/session'
import { changeOwnLanguage } from '../services/own-sign-in'

export default defineRoute({
  summary: 'Keep one\'s own language',
  ability: 'own.records',
  body: sessionChanges,
  answer: sessionView,
}, ({ work, body }) => changeOwnLanguage(work, body.language))
