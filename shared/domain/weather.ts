import { evaporationRate, heatIndexF, type WeatherEntered, windChillF } from './weather-formulas'

/** What a weather hazard warns of: three hazards of talks, and the fresh concrete itself. */
export const weatherTags = ['heat', 'cold', 'wind', 'concrete'] as const
/** One tag of a weather hazard. */
export type WeatherTag = (typeof weatherTags)[number]

/** The bands in which the day's figures can lie. */
export const weatherBands = [
  'veryHigh', 'high', 'moderate', 'caution', 'highHeat', 'newHands', 'frostbite', 'freezing', 'highWind', 'askBraceMaker',
  'evaporationLimit', 'evaporationAlarm', 'tooHot', 'tooCold',
] as const
/** One band. */
export type WeatherBand = (typeof weatherBands)[number]

/** One hazard of the day's weather, with where its limit comes from. */
export interface WeatherHazard {
  tag: WeatherTag
  band: WeatherBand
  source: string
}

/** The figures worked out from the weather; null where one is not known or its formula does not apply. */
export interface WeatherReport {
  heatIndexF: number | null
  windChillF: number | null
  /** lb/ft²/h; for slabs and wall tops. */
  evaporation: number | null
  /** Strictest first. */
  hazards: WeatherHazard[]
}

interface Figures extends WeatherEntered {
  heatIndexF: number | null
  /** Wind chill where there is one, otherwise the air temperature. */
  feltColdF: number | null
  evaporation: number | null
}

interface Band extends WeatherHazard {
  /** 4 stops work that is not made safe first, 1 is a reminder. */
  severity: 1 | 2 | 3 | 4
  holds(figures: Figures): boolean
}

/** 1 kg/m²/h in lb/ft²/h: 1 lb is 0.45359237 kg, 1 ft² is 0.09290304 m². */
const ONE_KG_PER_M2_IN_LB_PER_FT2 = 0.09290304 / 0.45359237

const OSHA_HEAT = 'OSHA worksite bands of the heat index; the higher band on the edge'

const atLeast = (value: number | null, limit: number) => value !== null && value >= limit
const atMost = (value: number | null, limit: number) => value !== null && value <= limit

/**
 * Every band with its limit and its source. Of the heat index only the highest band that holds is told. There is
 * no limit here for wind on an unpoured wall: the brace maker gives it, so a breeze only asks for it.
 */
const BANDS: readonly Band[] = [
  { tag: 'heat', band: 'veryHigh', severity: 4, source: OSHA_HEAT, holds: ({ heatIndexF: index }) => atLeast(index, 115) },
  { tag: 'heat', band: 'high', severity: 3, source: OSHA_HEAT, holds: ({ heatIndexF: index }) => atLeast(index, 103) && !atLeast(index, 115) },
  { tag: 'heat', band: 'moderate', severity: 2, source: OSHA_HEAT, holds: ({ heatIndexF: index }) => atLeast(index, 91) && !atLeast(index, 103) },
  {
    tag: 'heat', band: 'caution', severity: 1, source: 'US National Weather Service, caution from a heat index of 80 °F, from memory',
    holds: ({ heatIndexF: index }) => atLeast(index, 80) && !atLeast(index, 91),
  },
  {
    tag: 'heat', band: 'highHeat', severity: 3, source: 'California high-heat rules, 8 CCR 3395 (section from memory): air temperature of 95 °F',
    holds: ({ temperatureF }) => atLeast(temperatureF, 95),
  },
  {
    tag: 'heat', band: 'newHands', severity: 1, source: 'Common practice: new hands build up over two weeks',
    holds: ({ heatIndexF: index, temperatureF }) => atLeast(index, 80) || atLeast(temperatureF, 95),
  },
  {
    tag: 'cold', band: 'frostbite', severity: 4, source: 'US National Weather Service wind chill chart, 30 minutes to frostbite from about −18 °F, from memory',
    holds: ({ feltColdF }) => atMost(feltColdF, -18),
  },
  {
    tag: 'cold', band: 'freezing', severity: 2, source: 'Common practice: at or below 32 °F felt, water and wet gloves freeze',
    holds: ({ feltColdF }) => atMost(feltColdF, 32) && !atMost(feltColdF, -18),
  },
  {
    tag: 'wind', band: 'highWind', severity: 3, source: '29 CFR 1910.269, high wind when material is handled: 30 mph, from memory',
    holds: ({ windMph }) => atLeast(windMph, 30),
  },
  {
    tag: 'wind', band: 'askBraceMaker', severity: 2, source: 'The brace maker’s wind limit for an unpoured wall; asked from a moderate breeze (13 mph, Beaufort 4, from memory)',
    holds: ({ windMph }) => atLeast(windMph, 13),
  },
  {
    tag: 'concrete', band: 'tooHot', severity: 3, source: 'ACI 305.1: concrete at most 95 °F', holds: ({ concreteF }) => concreteF !== null && concreteF > 95,
  },
  {
    tag: 'concrete', band: 'evaporationLimit', severity: 3, source: 'ACI 305.1: air at 80 °F or more and evaporation above 1 kg/m²/h',
    holds: ({ evaporation, temperatureF }) => atLeast(temperatureF, 80) && evaporation !== null && evaporation > ONE_KG_PER_M2_IN_LB_PER_FT2,
  },
  {
    tag: 'concrete', band: 'evaporationAlarm', severity: 2, source: 'ACI 305R: 0.20 lb/ft²/h; the estimate is good to about 40 %',
    holds: ({ evaporation }) => atLeast(evaporation, 0.2),
  },
  {
    tag: 'concrete', band: 'tooCold', severity: 3, source: 'ASTM C94: deliver at 50 °F or more; thin sections 55 °F, from memory',
    holds: ({ concreteF }) => concreteF !== null && concreteF < 50,
  },
]

/**
 * The figures and hazards of a day's weather, strictest first; of equal strictness in a fixed order. A figure
 * that needs something not entered is null, and no hazard is guessed from it.
 */
export function weatherReport({ temperatureF, humidity, windMph, concreteF }: WeatherEntered): WeatherReport {
  const heatIndex = temperatureF !== null && humidity !== null ? heatIndexF(temperatureF, humidity) : null
  const windChill = temperatureF !== null && windMph !== null ? windChillF(temperatureF, windMph) : null
  const evaporation = temperatureF !== null && humidity !== null && windMph !== null && concreteF !== null
    ? evaporationRate({ temperatureF, humidity, windMph, concreteF })
    : null
  const figures = { temperatureF, humidity, windMph, concreteF, heatIndexF: heatIndex, feltColdF: windChill ?? temperatureF, evaporation }
  const hazards = BANDS
    .filter(band => band.holds(figures))
    .sort((first, second) => second.severity - first.severity)
    .map(({ tag, band, source }) => ({ tag, band, source }))
  return { heatIndexF: heatIndex, windChillF: windChill, evaporation, hazards }
}
