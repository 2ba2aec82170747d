import { placesView } from '#shared/schemas/places'
import { placesOf } from '../../services/places'

export default defineRoute({ summary: 'The sites that concern me today', ability: 'own.records', answer: placesView }, ({ work }) => placesOf(work))
