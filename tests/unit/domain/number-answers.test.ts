import { describe, expect, it } from 'vitest'
import { readNumber } from '#shared/domain/number-answers'

describe('a number as people type it', () => {
  it.each([
    ['2.5', '2.5'], ['2,5', '2.5'], [' 11 ', '11'], ['-4', '-4'], ['\u22124', '-4'], ['.75', '0.75'], [',75', '0.75'], ['0,125', '0.125'],
    ['3.', '3'], ['1234', '1234'], ['1.234', '1.234'], ['1234,5', '1234.5'], ['12,34', '12.34'],
  ])('%j reads as %s', (typed, text) => {
    expect(readNumber(typed)).toEqual({ isRead: true, text })
  })

  it.each(['1,234', '12,345', '1,234,567', '1,234.5', '1.234,5', '1.234.567'])('%j is ambiguous, not guessed', (typed) => {
    expect(readNumber(typed)).toEqual({ isRead: false, why: 'ambiguous' })
  })

  it.each(['', ' ', '.', ',', '-', 'eleven', '11 in', '1e3', '0x10', '5/8', 'NaN', 'Infinity', '9'.repeat(41)])('%j is no number', (typed) => {
    expect(readNumber(typed)).toEqual({ isRead: false, why: 'notANumber' })
  })

  it('may come as a number already, if it is finite', () => {
    expect(readNumber(11.25)).toEqual({ isRead: true, text: '11.25' })
    expect(readNumber(Number.NaN)).toEqual({ isRead: false, why: 'notANumber' })
    expect(readNumber(Number.POSITIVE_INFINITY)).toEqual({ isRead: false, why: 'notANumber' })
  })
})
