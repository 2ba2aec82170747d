import { remindersAnswer, remindersBody } from '#shared/schemas/credentials'
import { sendReminders } from '~~/server/services/reminders'

export default defineRoute({
  summary: 'Remind the holders and their foremen by mail',
  ability: 'reminders.send',
  body: remindersBody,
  answer: remindersAnswer,
}, ({ work, body }) => sendReminders(work, body.credentialIds))
