import { mailList, mailQuery } from '#shared/schemas/mail'
import { readMailQueue } from '../../services/mail-queue'

export default defineRoute({
  summary: 'The mail queue, the newest first',
  ability: 'mail.read',
  query: mailQuery,
  answer: mailList,
}, ({ work, query }) => readMailQueue(work, query))
