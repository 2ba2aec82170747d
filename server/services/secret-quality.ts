import { findPinFault } from '#shared/domain/pin'
import { Refusal } from './refusal'

/** Shortest password that is the only proof, after NIST SP 800-63B-4 (15 characters); no rule on kinds of characters. */
export const shortestPassword = 15

/** Below this many guesses (power of ten) a password is as good as listed. */
const leastGuessesLog10 = 8
const longestJudged = 100

const faultWords = {
  passwordTooShort: `At least ${shortestPassword} characters; a few words are easier to remember than signs`,
  passwordTooCommon: 'This is one of the first that others would try; choose other words',
  pinNotSixDigits: 'Six digits',
  pinTooEasy: 'This PIN is too easy to guess: no runs, repeats, dates, or the badge',
}

const refuse = (field: 'password' | 'pin', code: keyof typeof faultWords) => new Refusal('unprocessable', code, { message: faultWords[code], fields: { [field]: faultWords[code] } })

/** The dictionaries are large; they are read when the first password is judged. */
let judge: Promise<(secret: string, ownWords: string[]) => number> | undefined
async function loadJudge() {
  const [{ ZxcvbnFactory }, common, english] = await Promise.all([import('@zxcvbn-ts/core'), import('@zxcvbn-ts/language-common'), import('@zxcvbn-ts/language-en')])
  const factory = new ZxcvbnFactory({ dictionary: { ...common.dictionary, ...english.dictionary }, graphs: common.adjacencyGraphs })
  return (secret: string, ownWords: string[]) => factory.check(secret, ownWords).guessesLog10
}

/**
 * Refuses (422, field `password`) what is too short or what a guesser would try early: passwords on the common lists,
 * runs and repeats, and those made of `ownWords` (the company, the person, the product).
 */
export async function assertGoodPassword(password: string, ownWords: (string | null)[]): Promise<void> {
  const typed = password.normalize('NFC')
  if ([...typed].length < shortestPassword) throw refuse('password', 'passwordTooShort')
  const words = ['pourwright', ...ownWords.flatMap(word => [word ?? '', ...(word ?? '').split(/[\s@.,-]+/)])].filter(word => word.length > 2)
  const guesses = (await (judge ??= loadJudge()))(typed.slice(0, longestJudged), words)
  if (guesses < leastGuessesLog10) throw refuse('password', 'passwordTooCommon')
}

/** Refuses (422, field `pin`) a PIN that is not six digits or too easy to guess. */
export function assertGoodPin(pin: string, badge: string): void {
  const fault = findPinFault(pin, badge)
  if (fault) throw refuse('pin', fault)
}
