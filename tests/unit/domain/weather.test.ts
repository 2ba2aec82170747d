import { describe, expect, it } from 'vitest'
import { weatherReport } from '#shared/domain/weather'
import { evaporationRate, heatIndexF, windChillF } from '#shared/domain/weather-formulas'

const nothing = { temperatureF: null, humidity: null, windMph: null, concreteF: null }
const bands = (entered: Partial<Parameters<typeof weatherReport>[0]>) =>
  weatherReport({ ...nothing, ...entered }).hazards.map(hazard => hazard.band)

describe('the day’s figures', () => {
  it('are null when what they need was not entered, and warn of nothing', () => {
    expect(weatherReport(nothing)).toEqual({ heatIndexF: null, windChillF: null, evaporation: null, hazards: [] })
    expect(weatherReport({ ...nothing, temperatureF: 70, humidity: 50 })).toMatchObject({ windChillF: null, evaporation: null })
  })

  it('have a wind chill at 50 °F and above 3 mph, and none beyond', () => {
    expect(windChillF(50, 3.1)).not.toBeNull()
    expect(windChillF(50, 3)).toBeNull()
    expect(windChillF(50.1, 10)).toBeNull()
  })

  it('never have an evaporation below zero, nor one below 0 °F', () => {
    expect(evaporationRate({ temperatureF: 95, humidity: 100, windMph: 10, concreteF: 60 })).toBe(0)
    expect(evaporationRate({ temperatureF: -5, humidity: 50, windMph: 10, concreteF: 60 })).toBeNull()
  })

  it('refuse a humidity that cannot be', () => {
    expect(() => heatIndexF(90, 101)).toThrow(RangeError)
    expect(() => heatIndexF(90, -1)).toThrow(RangeError)
    expect(() => heatIndexF(90, Number.NaN)).toThrow(RangeError)
  })

  it('take the simple form up to the threshold and the regression from it', () => {
    const simple = (temperature: number, humidity: number) =>
      (0.5 * (temperature + 61 + (temperature - 68) * 1.2 + humidity * 0.094) + temperature) / 2
    expect(simple(79, 60)).toBeLessThan(80)
    expect(heatIndexF(79, 60)).toBe(simple(79, 60))
    expect(simple(81, 60)).toBeGreaterThan(80)
    expect(heatIndexF(81, 60)).not.toBe(simple(81, 60))
  })
})

describe('the hazards', () => {
  it('of heat take the band of the heat index, a caution already from 80 °F', () => {
    expect(bands({ temperatureF: 79, humidity: 40 })).toEqual([])
    expect(bands({ temperatureF: 86, humidity: 40 })).toEqual(['caution', 'newHands'])
    expect(bands({ temperatureF: 90, humidity: 50 })).toEqual(['moderate', 'newHands'])
    expect(bands({ temperatureF: 90, humidity: 70 })).toEqual(['high', 'newHands'])
    expect(bands({ temperatureF: 94, humidity: 75 })).toEqual(['veryHigh', 'newHands'])
  })

  it('tell high heat from the air temperature alone, at 95 °F and not below', () => {
    expect(bands({ temperatureF: 95 })).toEqual(['highHeat', 'newHands'])
    expect(bands({ temperatureF: 94.9 })).toEqual([])
    expect(bands({ temperatureF: 100, humidity: 55 })).toEqual(['veryHigh', 'highHeat', 'newHands'])
  })

  it('of cold go by the wind chill where there is one, otherwise by the air', () => {
    expect(bands({ temperatureF: 32 })).toEqual(['freezing'])
    expect(bands({ temperatureF: 33 })).toEqual([])
    expect(bands({ temperatureF: 36, windMph: 12 })).toEqual(['freezing'])
    expect(bands({ temperatureF: 0, windMph: 20 })).toContain('frostbite')
  })

  it('of wind ask for the brace maker’s limit and never assume one', () => {
    expect(bands({ windMph: 12 })).toEqual([])
    expect(bands({ windMph: 13 })).toEqual(['askBraceMaker'])
    expect(bands({ windMph: 30 })).toEqual(['highWind', 'askBraceMaker'])
  })

  it('of fresh concrete tell what is too hot, too cold, or drying too fast', () => {
    expect(bands({ concreteF: 95 })).toEqual([])
    expect(bands({ concreteF: 95.1 })).toEqual(['tooHot'])
    expect(bands({ concreteF: 50 })).toEqual([])
    expect(bands({ concreteF: 49.9 })).toEqual(['tooCold'])
    expect(bands({ temperatureF: 75, humidity: 20, windMph: 12, concreteF: 85 })).toEqual(['evaporationAlarm'])
    expect(bands({ temperatureF: 80, humidity: 20, windMph: 12, concreteF: 87 })).toContain('evaporationLimit')
  })

  it('stand strictest first and each carry a source', () => {
    const { hazards } = weatherReport({ temperatureF: 100, humidity: 55, windMph: 30, concreteF: 97 })
    expect(hazards.map(hazard => hazard.band))
      .toEqual(['veryHigh', 'highHeat', 'highWind', 'tooHot', 'evaporationLimit', 'askBraceMaker', 'evaporationAlarm', 'newHands'])
    expect(hazards.filter(hazard => hazard.source.length < 10)).toEqual([])
  })
})
