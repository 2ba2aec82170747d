import { describe, expect, it } from 'vitest'
import { absolute, add, convert, divide, fractionOf, isAtMost, isSameQuantity, isUnit, multiply, type Unit } from '#shared/domain/units'

const isEqual = (value: string, from: Unit, to: Unit, expected: string) => {
  const [got, want] = [convert(fractionOf(value), from, to), fractionOf(expected)]
  return got.top * want.bottom === want.top * got.bottom
}

describe('a value in another unit', () => {
  it.each<[string, Unit, string, Unit]>([
    ['1', 'in', '25.4', 'mm'], ['1', 'ft', '12', 'in'], ['304.8', 'mm', '1', 'ft'], ['1', 'm', '100', 'cm'], ['25.4', 'cm', '10', 'in'],
    ['1', 'lb', '0.45359237', 'kg'], ['0', 'degC', '32', 'degF'], ['212', 'degF', '100', 'degC'], ['-40', 'degF', '-40', 'degC'],
    ['7', '%', '7', '%'],
  ])('%s %s is exactly %s %s', (value, from, expected, to) => {
    expect(isEqual(value, from, to, expected)).toBe(true)
    expect(isEqual(expected, to, from, value)).toBe(true)
  })

  it('of 600 lb/ft2 is 28.728 kPa to the last digit shown', () => {
    const { top, bottom } = convert(fractionOf('600'), 'lb/ft2', 'kPa')
    expect(Number(top * 1_000_000n / bottom) / 1e6).toBe(28.728155)
  })

  it('is refused between things that cannot be compared', () => {
    expect(isSameQuantity('in', 'lb')).toBe(false)
    expect(isSameQuantity('degC', 'degF')).toBe(true)
    expect(() => convert(fractionOf('1'), 'in', 'lb')).toThrow(RangeError)
    expect(() => convert(fractionOf('1'), 'degC', '%')).toThrow(RangeError)
    expect(() => convert(fractionOf('1'), '%', 'degF')).toThrow(RangeError)
  })
})

describe('decimal text', () => {
  it('is taken exactly', () => {
    expect(fractionOf('-2.50')).toEqual({ top: -250n, bottom: 100n })
    expect(fractionOf('1e-7')).toEqual({ top: 1n, bottom: 10_000_000n })
    expect(fractionOf('1.5e+3')).toEqual({ top: 1500n, bottom: 1n })
  })

  it.each(['', 'abc', '1,5', '1e9999', '--1', '.'])('%j is refused', (text) => {
    expect(() => fractionOf(text)).toThrow(RangeError)
  })

  it('adds up without the error of binary fractions', () => {
    const sum = add(fractionOf('0.1'), fractionOf('0.2'))
    expect(isAtMost(sum, fractionOf('0.3')) && isAtMost(fractionOf('0.3'), sum)).toBe(true)
  })

  it('divides with the sign above, and never by zero', () => {
    expect(divide(fractionOf('1'), fractionOf('-2'))).toEqual({ top: -1n, bottom: 2n })
    expect(absolute(multiply(fractionOf('-3'), fractionOf('2')))).toEqual({ top: 6n, bottom: 1n })
    expect(() => divide(fractionOf('1'), fractionOf('0'))).toThrow(RangeError)
  })
})

describe('a unit', () => {
  it('is one of the list, spelled as there', () => {
    expect(isUnit('lb/ft2')).toBe(true)
    expect(isUnit('IN')).toBe(false)
    expect(isUnit('furlong')).toBe(false)
  })
})
