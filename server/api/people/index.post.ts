import { newPersonBody, personView } from '#shared/schemas/people'
import { addPerson } from '../../services/people'

export default defineRoute({
  summary: 'Add a person',
  ability: 'people.write',
  body: newPersonBody,
  answer: personView,
  status: 201,
}, ({ work, body }) => addPerson(work, body))
