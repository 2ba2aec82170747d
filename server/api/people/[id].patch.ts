import { idParams } from '#shared/schemas/common'
import { personChanges, personView } from '#shared/schemas/people'
import { changePerson } from '../../services/people'

export default defineRoute({
  summary: 'Change a person; people are never deleted',
  ability: 'people.write',
  params: idParams,
  body: personChanges,
  answer: personView,
}, ({ work, params, body }) => changePerson(work, params.id, body))
