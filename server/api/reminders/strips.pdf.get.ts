import { stripsQuery } from '#shared/schemas/mail'
import { printStrips } from '../../services/reminders'

export default defineRoute({
  summary: 'Paper strips of what ends soon, one a person, in their language',
  ability: 'people.read', query: stripsQuery,
}, async ({ work, query, event }) => sendDownload(event, { body: await printStrips(work, query), type: 'application/pdf', fileName: `strips-${work.today}.pdf` }, 'inline'))
