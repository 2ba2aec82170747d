import { idParams } from '#shared/schemas/common'
import { crewWallView } from '#shared/schemas/crew-wall'
import { languageQuery } from '#shared/schemas/learning'
import { readCrewWall } from '../../../services/crew-wall'

export default defineRoute({
  summary: 'How a crew stands on each block of the training wall',
  ability: 'people.read',
  params: idParams,
  query: languageQuery,
  answer: crewWallView,
}, ({ work, params, query }) => readCrewWall(work, { crewId: params.id, language: query.language ?? work.actor.language }))
