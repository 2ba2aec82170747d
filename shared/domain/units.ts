/** Units in which a number may be asked for and answered. */
export const units = ['in', 'ft', 'mm', 'cm', 'm', 'lb', 'kg', 'lb/ft2', 'kPa', 'degF', 'degC', '%'] as const
/** One unit. */
export type Unit = (typeof units)[number]

/** An exact fraction. The denominator is above zero. */
export interface Fraction {
  top: bigint
  bottom: bigint
}

type Quantity = 'length' | 'mass' | 'pressure' | 'temperature' | 'share'

/**
 * Exact values in the quantity's base unit: metre, kilogram, pascal. The inch is 0.0254 m and the pound
 * 0.45359237 kg by definition (international yard and pound, 1959); standard gravity is 9.80665 m/s².
 */
const FACTORS: Record<Exclude<Unit, 'degF' | 'degC'>, { quantity: Quantity, factor: Fraction }> = {
  'in': { quantity: 'length', factor: fractionOf('0.0254') },
  'ft': { quantity: 'length', factor: fractionOf('0.3048') },
  'mm': { quantity: 'length', factor: fractionOf('0.001') },
  'cm': { quantity: 'length', factor: fractionOf('0.01') },
  'm': { quantity: 'length', factor: fractionOf('1') },
  'lb': { quantity: 'mass', factor: fractionOf('0.45359237') },
  'kg': { quantity: 'mass', factor: fractionOf('1') },
  'lb/ft2': { quantity: 'pressure', factor: divide(fractionOf('4.4482216152605'), fractionOf('0.09290304')) },
  'kPa': { quantity: 'pressure', factor: fractionOf('1000') },
  '%': { quantity: 'share', factor: fractionOf('1') },
}

/** True for a unit that this product knows. */
export function isUnit(text: string): text is Unit {
  return units.some(unit => unit === text)
}

/** True when one unit can be turned into the other: inches and metres, not inches and pounds. */
export function isSameQuantity(first: Unit, second: Unit): boolean {
  return quantityOf(first) === quantityOf(second)
}

/** A value in another unit, exactly. Throws a RangeError when the two measure different things. */
export function convert(value: Fraction, from: Unit, to: Unit): Fraction {
  if (from === to) return value
  if (!isSameQuantity(from, to)) throw new RangeError(`Cannot turn ${from} into ${to}`)
  if (from === 'degC') return add(divide(multiply(value, fractionOf('9')), fractionOf('5')), fractionOf('32'))
  if (from === 'degF') return divide(multiply(add(value, fractionOf('-32')), fractionOf('5')), fractionOf('9'))
  if (to === 'degC' || to === 'degF') throw new RangeError(`Cannot turn ${from} into ${to}`)
  return divide(multiply(value, FACTORS[from].factor), FACTORS[to].factor)
}

/** The exact value of decimal text such as `-2.50` or `1e-7`. Throws a RangeError for anything else. */
export function fractionOf(text: string): Fraction {
  const match = /^([+-]?)(\d+)(?:\.(\d+))?(?:e([+-]?\d{1,3}))?$/i.exec(text)
  if (!match) throw new RangeError(`Not a decimal number: ${text}`)
  const [, sign = '', whole = '0', part = '', power = '0'] = match
  const digits = BigInt(whole + part) * (sign === '-' ? -1n : 1n)
  const exponent = Number(power) - part.length
  return exponent >= 0
    ? { top: digits * 10n ** BigInt(exponent), bottom: 1n }
    : { top: digits, bottom: 10n ** BigInt(-exponent) }
}

/** The sum, exactly. */
export function add(first: Fraction, second: Fraction): Fraction {
  return { top: first.top * second.bottom + second.top * first.bottom, bottom: first.bottom * second.bottom }
}

/** The product, exactly. */
export function multiply(first: Fraction, second: Fraction): Fraction {
  return { top: first.top * second.top, bottom: first.bottom * second.bottom }
}

/** The quotient, exactly. Throws a RangeError for a division by zero. */
export function divide(first: Fraction, second: Fraction): Fraction {
  if (second.top === 0n) throw new RangeError('Division by zero')
  const sign = second.top < 0n ? -1n : 1n
  return { top: first.top * second.bottom * sign, bottom: first.bottom * second.top * sign }
}

/** The size without the sign. */
export function absolute(value: Fraction): Fraction {
  return value.top < 0n ? { top: -value.top, bottom: value.bottom } : value
}

/** True when the first is at most the second; equal counts. */
export function isAtMost(first: Fraction, second: Fraction): boolean {
  return first.top * second.bottom <= second.top * first.bottom
}

function quantityOf(unit: Unit): Quantity {
  return unit === 'degF' || unit === 'degC' ? 'temperature' : FACTORS[unit].quantity
}
