import { talkHazards, type TalkHazard } from '#shared/domain/states'
import { type WeatherReport, weatherReport } from '#shared/domain/weather'

/** Weather as it was entered; what is missing is unknown, never guessed. */
export interface WeatherInput { temperatureF?: number, humidity?: number, windMph?: number, concreteF?: number }

/** The figures and hazards of what was entered. */
export function hazardsOf({ temperatureF, humidity, windMph, concreteF }: WeatherInput): WeatherReport {
  return weatherReport({ temperatureF: temperatureF ?? null, humidity: humidity ?? null, windMph: windMph ?? null, concreteF: concreteF ?? null })
}

/** The hazards that talks speak of. */
export function talkHazardsOf(weather: WeatherInput): TalkHazard[] {
  const tags = new Set<string>(hazardsOf(weather).hazards.map(hazard => hazard.tag))
  return talkHazards.filter(hazard => tags.has(hazard))
}
