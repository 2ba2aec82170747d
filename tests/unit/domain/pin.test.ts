import { describe, expect, it } from 'vitest'
import { findPinFault } from '../../../shared/domain/pin'

const badge = '2041'

describe('a PIN', () => {
  it.each(['739416', '580372', '904718', '630952'])('may be %s', pin => expect(findPinFault(pin, badge)).toBeNull())

  it.each(['', '12345', '1234567', '73941a', ' 73941', '７３９４１６', '739-41'])('is refused when it is not six digits: "%s"', pin => expect(findPinFault(pin, badge)).toBe('pinNotSixDigits'))

  it.each(['123456', '654321', '890123', '234569', '012345', '987654', '123789', '321987'])('is refused as a run: %s', pin => expect(findPinFault(pin, badge)).toBe('pinTooEasy'))

  it.each(['000000', '777777', '121212', '486486', '553399', '788887', '748847', '949499', '559559'])('is refused as a repeat: %s', pin => expect(findPinFault(pin, badge)).toBe('pinTooEasy'))

  it.each([['073176', 'US, month first'], ['310776', 'day first'], ['760731', 'year first'], ['022996', 'a leap day'], ['197605', 'year and month'], ['051976', 'month and year']])('is refused as a date: %s (%s)', pin => expect(findPinFault(pin, badge)).toBe('pinTooEasy'))

  it('may look like a day that does not exist', () => expect(findPinFault('739432', badge)).toBeNull())

  it.each(['204173', '732041', '820415', '140293', '731402'])('is refused when it holds the badge: %s', pin => expect(findPinFault(pin, badge)).toBe('pinTooEasy'))

  it('is refused when a long badge holds it', () => expect(findPinFault('739416', 'A-97394168')).toBe('pinTooEasy'))
  it('is refused when it is a short badge filled with zeros', () => expect(findPinFault('000042', '42')).toBe('pinTooEasy'))
  it('is not held against a badge without digits', () => expect(findPinFault('739416', 'HQ')).toBeNull())

  it.each(['147258', '159753', '258025'])('is refused as a walk over the keypad: %s', pin => expect(findPinFault(pin, badge)).toBe('pinTooEasy'))
})
