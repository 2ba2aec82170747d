/** The weather as entered, each figure null when it is not known. */
export interface WeatherEntered {
  temperatureF: number | null
  /** Relative humidity in percent, 0 to 100. */
  humidity: number | null
  windMph: number | null
  /** Temperature of the fresh concrete. */
  concreteF: number | null
}

/** From this average of the simple form and the air temperature on, the full regression is the answer (°F). */
const REGRESSION_FROM_F = 80

/** Wind chill is defined at or below this air temperature (°F) and above this wind (mph). */
const WIND_CHILL_LIMITS = { highestF: 50, windAboveMph: 3 }

/**
 * Heat index in the shade in °F, not rounded, by the US National Weather Service: the simple form averaged with
 * the temperature decides; from 80 °F on it is the Rothfusz regression with the two adjustments. Full sun adds up
 * to 15 °F more. Throws a RangeError for a humidity outside 0 to 100 %.
 */
export function heatIndexF(temperatureF: number, humidity: number): number {
  requireHumidity(humidity)
  const simple = 0.5 * (temperatureF + 61 + (temperatureF - 68) * 1.2 + humidity * 0.094)
  const average = (simple + temperatureF) / 2
  if (average < REGRESSION_FROM_F) return average
  return heatRegressionF(temperatureF, humidity) + dryAdjustment(temperatureF, humidity) + dampAdjustment(temperatureF, humidity)
}

/** The Rothfusz regression alone in °F, as in the printed heat index chart (SR 90-23, US National Weather Service). */
export function heatRegressionF(temperatureF: number, humidity: number): number {
  const [t, r] = [temperatureF, humidity]
  return -42.379 + 2.04901523 * t + 10.14333127 * r - 0.22475541 * t * r - 0.00683783 * t * t - 0.05481717 * r * r
    + 0.00122874 * t * t * r + 0.00085282 * t * r * r - 0.00000199 * t * t * r * r
}

/**
 * Wind chill in °F, not rounded, by the 2001 formula of the US National Weather Service; null above 50 °F and
 * up to 3 mph, where there is none.
 */
export function windChillF(temperatureF: number, windMph: number): number | null {
  if (temperatureF > WIND_CHILL_LIMITS.highestF || !(windMph > WIND_CHILL_LIMITS.windAboveMph)) return null
  const power = windMph ** 0.16
  return 35.74 + 0.6215 * temperatureF - 35.75 * power + 0.4275 * temperatureF * power
}

/**
 * Evaporation from fresh concrete in lb/ft²/h, never below 0, by Uno 1998 (inch-pound form); good to about 40 %.
 * For slabs and wall tops. Null below 0 °F, where the formula has no value, or for a wind below 0. Throws a
 * RangeError for a humidity outside 0 to 100 %.
 */
export function evaporationRate(
  { temperatureF, humidity, windMph, concreteF }: { temperatureF: number, humidity: number, windMph: number, concreteF: number },
): number | null {
  requireHumidity(humidity)
  if (temperatureF < 0 || concreteF < 0 || windMph < 0) return null
  const drive = concreteF ** 2.5 - (humidity / 100) * temperatureF ** 2.5
  return Math.max(0, drive * (1 + 0.4 * windMph) * 1e-6)
}

/** Below 13 % humidity and from 80 to 112 °F the regression reads too high. */
function dryAdjustment(temperatureF: number, humidity: number): number {
  if (humidity >= 13 || temperatureF < 80 || temperatureF > 112) return 0
  return -((13 - humidity) / 4) * Math.sqrt((17 - Math.abs(temperatureF - 95)) / 17)
}

/** Above 85 % humidity and from 80 to 87 °F the regression reads too low. */
function dampAdjustment(temperatureF: number, humidity: number): number {
  if (humidity <= 85 || temperatureF < 80 || temperatureF > 87) return 0
  return ((humidity - 85) / 10) * ((87 - temperatureF) / 5)
}

function requireHumidity(humidity: number): void {
  if (!(humidity >= 0 && humidity <= 100)) throw new RangeError(`Humidity is a percentage from 0 to 100: ${humidity}`)
}
