import { idParams } from '#shared/schemas/common'
import { languageQuery } from '#shared/schemas/learning'
import { personRecordView } from '#shared/schemas/person-record'
import { readPersonRecord } from '../../../services/person-record'

export default defineRoute({
  summary: 'A person\'s training wall and last sign-ins',
  ability: 'people.read',
  params: idParams,
  query: languageQuery,
  answer: personRecordView,
}, async ({ work, params, query, event }) => readPersonRecord(work, await getTeaching(event), { personId: params.id, language: query.language ?? work.actor.language }))
