import { describe, expect, it } from 'vitest'
import { evaporationRate, heatIndexF, heatRegressionF, windChillF } from '#shared/domain/weather-formulas'

describe('heat index, US National Weather Service chart (the regression without its adjustments)', () => {
  it.each([
    [100, 40, 109], [100, 45, 114], [100, 50, 118], [100, 55, 124], [96, 50, 108], [96, 60, 116], [96, 70, 126],
    [90, 40, 91], [90, 50, 95], [90, 60, 100], [90, 70, 106], [90, 80, 113], [90, 90, 122], [86, 60, 91], [86, 80, 100],
  ])('%i °F at %i %% reads %i', (temperature, humidity, chart) => {
    expect(Math.round(heatRegressionF(temperature, humidity))).toBe(chart)
  })
})

describe('heat index with the adjustments, computed from the service’s formula', () => {
  it.each([[100, 10, 94.122], [85, 90, 101.781], [75, 50, 74.775]])('%i °F at %i %% is %f', (temperature, humidity, expected) => {
    expect(heatIndexF(temperature, humidity)).toBeCloseTo(expected, 3)
  })
})

describe('wind chill, US National Weather Service chart of 2001', () => {
  it.each([
    [40, 5, 36], [40, 20, 30], [40, 30, 28], [15, 25, -4], [0, 5, -11], [0, 30, -26], [-15, 35, -48], [-30, 5, -46],
  ])('%i °F at %i mph reads %i', (temperature, wind, chart) => {
    expect(Math.round(windChillF(temperature, wind) ?? Number.NaN)).toBe(chart)
  })
})

describe('evaporation, Uno 1998 in inch-pound units', () => {
  it.each([
    [87, 80, 50, 12, 0.2435], [70, 70, 50, 10, 0.1025], [90, 90, 30, 20, 0.4841], [70, 70, 50, 0, 0.0205],
  ])('concrete %i °F, air %i °F, %i %%, %i mph gives %f lb/ft²/h', (concreteF, temperatureF, humidity, windMph, expected) => {
    expect(evaporationRate({ temperatureF, humidity, windMph, concreteF })).toBeCloseTo(expected, 4)
  })
})
