import { idParams } from '#shared/schemas/common'
import { personView } from '#shared/schemas/people'
import { readPerson } from '../../services/people'

export default defineRoute({
  summary: 'One person within reach',
  ability: 'people.read',
  params: idParams,
  answer: personView,
}, ({ work, params }) => readPerson(work, params.id))
