/** Days from today to the last good day of credentials that need attention; a negative one has run out. */
export const runningOut: Readonly<Record<string, number>> = {
  'kowalczyk lift-truck': 4,
  'montoya respirator-fit': 6,
  'solheim first-aid-cpr': 9,
  'nunez respirator-training': 11,
  'skaggs before-the-pour': 13,
  'pena steel': 18,
  'ordonez bracing-and-plumb': 21,
  'yellowhorse first-aid-cpr': 23,
  'renteria pour-rate': 27,
  'raman heat-illness': 28,
  'le respirator-fit': 29,
  'escobedo heat-illness': 29,
  'bondar stacking': 33,
  'tran lift-truck': 36,
  'coates concrete-for-walls': 38,
  'boyd first-aid-cpr': 40,
  'arriaga steel': 43,
  'whitlock running-bond': 44,
  'bauer pump-and-hose': 49,
  'schroeder first-aid-cpr': 52,
  'maldonado respirator-fit': 54,
  'castaneda bracing-and-plumb': 57,
  'lindqvist pour-lead': 58,
  'adeyemi first-aid-cpr': 60,
  'herrera pump-and-hose': -3,
  'castaneda respirator-training': -6,
  'ostrander lift-truck': -12,
  'pena respirator-fit': -25,
  'solis heat-illness': -20,
  'abernathy first-aid-cpr': -40,
}

/** Outside cards that people sent in and nobody has looked at yet: days since the issue, days since it was sent in. */
export const waitingForVerification: readonly { key: string, type: string, issuedDaysAgo: number, sentDaysAgo: number }[] = [
  { key: 'nkemelu', type: 'outreach-card', issuedDaysAgo: 402, sentDaysAgo: 8 },
  { key: 'aguilar', type: 'fall-protection', issuedDaysAgo: 13, sentDaysAgo: 5 },
  { key: 'yoon', type: 'first-aid-cpr', issuedDaysAgo: 6, sentDaysAgo: 2 },
  { key: 'vang', type: 'aerial-lift', issuedDaysAgo: 9, sentDaysAgo: 1 },
]

/** A credential that the safety manager took back. */
export const withdrawn = {
  key: 'escobedo', type: 'bracing-and-plumb', daysAgo: 20,
  reason: 'Two brace feet found unpinned on the north wall. Takes the module again with an assessor.',
} as const

/** A card that was refused. */
export const rejected = { key: 'barrios', type: 'fall-protection', issuedDaysAgo: 300, sentDaysAgo: 31, note: 'The card carries another person\'s name.' } as const

/** A class that is booked and entered ahead. */
export const ahead = { key: 'karimi', type: 'scaffold-erector', inDays: 5 } as const

/** Somebody taken off all duties. */
export const held = { key: 'trujillo', daysAgo: 2, reason: 'Walked under a hung load twice in one morning. Back after a talk with the safety manager.' } as const

/** Days since cards were issued whose day matters: the assessors held theirs before they signed anybody off, and who is new to a pour duty was taught lately. */
export const issuedDaysAgo: Readonly<Record<string, number>> = {
  'zamora stacking': 661,
  'zamora running-bond': 654,
  'kowalczyk stacking': 658,
  'kowalczyk running-bond': 651,
  'tran stacking': 657,
  'tran running-bond': 650,
  'camacho pump-and-hose': 75,
}

/** Days since the assessors were named in writing. */
export const assessorsNamedDaysAgo = 645

/** Learners who are on their way: the last quiz, and whether the hands-on was asked for. */
export const onTheWay = [
  { key: 'adeyemi', module: 'stacking', quizDaysAgo: 2, passed: true, asksForHandsOn: true },
  { key: 'nkemelu', module: 'stacking', quizDaysAgo: 1, passed: false, asksForHandsOn: false },
] as const

/** Lessons read, quiz not tried. */
export const reading = { key: 'karimi', module: 'running-bond', lessons: 2, daysAgo: 3 } as const

/** Days since everybody who pours went through the yearly blowout drill together. */
export const blowoutDrillDaysAgo = 40
