import { idParams } from '#shared/schemas/common'
import { previewQuery } from '#shared/schemas/crews-and-sites'
import { mergeBody, mergeView } from '#shared/schemas/people'
import { mergePerson } from '../../../services/merge-people'

export default defineRoute({
  summary: 'Give what one entry of a person holds to the other that stays; ?preview=true only counts',
  ability: 'people.write', params: idParams, query: previewQuery, body: mergeBody, answer: mergeView,
}, ({ work, params, query, body }) => mergePerson(work, params.id, body, query.preview ?? false))
