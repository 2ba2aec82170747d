/** Text read as a number: exact decimal text with a point, or why not. */
export type ReadNumber = { isRead: true, text: string } | { isRead: false, why: 'ambiguous' | 'notANumber' }

const MOST_DIGITS = 40

/**
 * Reads a number as people type it. `2.5` and `2,5` are the same. `1,234` could be a thousand or one and a bit,
 * so it is refused as ambiguous; `1,234.5` and `1.234,5` are refused as well, and nothing is guessed. `0,125`
 * can only be a decimal. Blanks around it, a leading sign and a true minus sign are fine.
 */
export function readNumber(answer: number | string): ReadNumber {
  if (typeof answer === 'number') {
    return Number.isFinite(answer) ? { isRead: true, text: String(answer) } : { isRead: false, why: 'notANumber' }
  }
  const text = answer.trim().replace('\u2212', '-')
  if (text.length > MOST_DIGITS) return { isRead: false, why: 'notANumber' }
  if (/^[+-]?[1-9]\d{0,2}(?:,\d{3})+$/.test(text) || /^[+-]?\d+(?:[.,]\d+){2,}$/.test(text)) return { isRead: false, why: 'ambiguous' }
  const match = /^([+-]?)(\d*)(?:[.,](\d*))?$/.exec(text)
  const [, sign = '', whole = '', part = ''] = match ?? []
  if (!match || whole + part === '') return { isRead: false, why: 'notANumber' }
  return { isRead: true, text: `${sign}${whole || '0'}${part ? `.${part}` : ''}` }
}
