import { reminderPreview } from '#shared/schemas/mail'
import { previewReminders } from '../../services/reminders'

export default defineRoute({
  summary: 'What the next run of the reminders would send',
  ability: 'mail.read', answer: reminderPreview,
}, ({ work }) => previewReminders(work))
