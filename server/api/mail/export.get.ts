import { exportOf, tableFormats } from '#shared/schemas/common'
import { mailQuery } from '#shared/schemas/mail'
import { exportMail } from '~~/server/services/list-exports'

export default defineRoute({
  summary: 'Every message of the filtered queue, without its text, as a file',
  ability: 'mail.read',
  query: exportOf(mailQuery, tableFormats),
}, async ({ work, query, event }) => sendDownload(event, await exportMail(work, query)))
