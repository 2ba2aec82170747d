import { z } from 'zod'
import { weatherBands, weatherTags } from '../domain/weather'

/** Weather as the foreman entered it, US customary units. */
export const weather = z.strictObject({
  temperatureF: z.number().min(-80).max(140).optional(),
  humidity: z.number().min(0).max(100).optional(),
  windMph: z.number().min(0).max(200).optional(),
  concreteF: z.number().min(20).max(140).optional(),
  sky: z.enum(['dry', 'wet', 'snow', 'dark']).optional(),
})
export type Weather = z.infer<typeof weather>

const fromQuery = (least: number, most: number) => z.coerce.number().min(least).max(most).optional()
export const weatherQuery = {
  temperatureF: fromQuery(-80, 140),
  humidity: fromQuery(0, 100),
  windMph: fromQuery(0, 200),
  concreteF: fromQuery(20, 140),
}
export const weatherHazardsQuery = z.strictObject(weatherQuery)

export const weatherHazard = z.object({ tag: z.enum(weatherTags), band: z.enum(weatherBands), source: z.string() })
export const weatherHazardsView = z.object({
  heatIndexF: z.number().nullable(),
  windChillF: z.number().nullable(),
  evaporation: z.number().nullable(),
  hazards: z.array(weatherHazard),
})
export type WeatherHazardsView = z.infer<typeof weatherHazardsView>
