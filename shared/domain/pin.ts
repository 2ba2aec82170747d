/** A PIN has this many digits. */
export const pinDigits = 6

/** Why a PIN is refused: not six digits, or one that a stranger would try early. */
export type PinFault = 'pinNotSixDigits' | 'pinTooEasy'

/** Walks over a phone's keypad that people take for chance. */
const keypadWalks = new Set(['147258', '258369', '147369', '159357', '159753', '357159', '753159', '951753', '258025', '147896', '741852', '852963', '963852', '369258', '789456', '456123', '014725'])

const isRun = (digits: number[]) => [1, -1].some((step) => {
  let length = 1
  for (let at = 1; at < digits.length; at++) {
    length = digits[at] === (digits[at - 1]! + step + 10) % 10 ? length + 1 : 1
    if (length >= 5) return true
  }
  return false
})

/** Two runs of three, such as 123789 or 321321. */
const isTwoRuns = (pin: string) => [pin.slice(0, 3), pin.slice(3)].every(half => [1, -1].some(step => +half[1]! - +half[0]! === step && +half[2]! - +half[1]! === step))

function isRepeat(pin: string): boolean {
  const often = Math.max(...[...pin].map(digit => pin.split(digit).length - 1))
  const isMirrored = [...pin].reverse().join('') === pin
  const isPairs = /^(\d)\1(\d)\2(\d)\3$/.test(pin)
  return often >= 4 || new Set(pin).size < 3 || isMirrored || isPairs || /^(\d{2})\1\1$/.test(pin) || /^(\d{3})\1$/.test(pin)
}

const isDayOfMonth = (day: number, month: number) => month >= 1 && month <= 12 && day >= 1 && day <= [31, 29, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31][month - 1]!

/** Six digits that read as a day (month, day and year in the orders people write) or as a month of 1900 to 2099. */
function isDate(pin: string): boolean {
  const [a, b, c] = [+pin.slice(0, 2), +pin.slice(2, 4), +pin.slice(4)]
  const isMonthAndYear = (year: string, month: number) => /^(19|20)/.test(year) && month >= 1 && month <= 12
  return isDayOfMonth(b, a) || isDayOfMonth(a, b) || isDayOfMonth(c, b)
    || isMonthAndYear(pin.slice(0, 4), c) || isMonthAndYear(pin.slice(2), a)
}

/** The badge itself, backwards, or with more digits around it; badges under three digits say too little to be looked for. */
function holdsBadge(pin: string, badge: string): boolean {
  const digits = badge.replace(/\D/g, '')
  if (digits.length < 3) return pin === digits.padStart(pinDigits, '0')
  const backwards = [...digits].reverse().join('')
  return digits.length <= pinDigits ? pin.includes(digits) || pin.includes(backwards) : digits.includes(pin)
}

/**
 * What is wrong with a PIN that somebody wants to set, or null. Refused are runs, repeats, dates, keypad walks and the
 * badge; a PIN already in use is never judged again. Common practice: these are what guessers try first.
 */
export function findPinFault(pin: string, badge: string): PinFault | null {
  if (!/^\d{6}$/.test(pin)) return 'pinNotSixDigits'
  const isEasy = isRun([...pin].map(Number)) || isTwoRuns(pin) || isRepeat(pin) || isDate(pin) || keypadWalks.has(pin) || holdsBadge(pin, badge)
  return isEasy ? 'pinTooEasy' : null
}
