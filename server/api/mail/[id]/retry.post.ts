import { idParams } from '#shared/schemas/common'
import { mailView } from '#shared/schemas/mail'
import { retryMail } from '../../../services/mail-queue'

export default defineRoute({
  summary: 'Try a failed or waiting message again now',
  ability: 'mail.read',
  params: idParams,
  answer: mailView,
}, async ({ work, params, event }) => {
  const mail = await retryMail(work, params.id)
  event.waitUntil(runTask('mail:send'))
  return mail
})
