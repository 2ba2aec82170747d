import { weatherHazardsQuery, weatherHazardsView } from '#shared/schemas/weather'
import { hazardsOf } from '../services/weather-hazards'

export default defineRoute({
  summary: 'Heat index, wind chill, evaporation and the hazards of a day\'s weather',
  ability: 'briefing.read', query: weatherHazardsQuery, answer: weatherHazardsView,
}, ({ query }) => hazardsOf(query))
