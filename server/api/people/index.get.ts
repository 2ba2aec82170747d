import { peopleQuery, peopleView } from '#shared/schemas/people'
import { readPeople } from '../../services/people'

export default defineRoute({
  summary: 'The people within reach, filtered and sorted',
  ability: 'people.read',
  query: peopleQuery,
  answer: peopleView,
}, ({ work, query }) => readPeople(work, query))
