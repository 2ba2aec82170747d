import type { Language } from './states'

/** A name taken apart: what comes first, the surnames with their particles, and what follows ("Jr."). */
interface NameParts {
  given: string[]
  surnames: string[]
  suffix: string
}

/** Words that belong to the name after them. */
const PARTICLES = new Set(['da', 'de', 'del', 'der', 'di', 'do', 'dos', 'du', 'la', 'las', 'le', 'los', 'san', 'santa', 'van', 'von', 'y'])

const SUFFIX = /^(?:jr|sr|ii|iii|iv)\.?$/i

/** Spanish surnames that do not end in "ez"; enough to tell two surnames from two given names in a name of three words. */
const SPANISH_SURNAMES = new Set([
  'aguilar', 'avila', 'campos', 'castillo', 'castro', 'contreras', 'cruz', 'delgado', 'diaz', 'flores', 'fuentes', 'garcia', 'garza',
  'guerrero', 'herrera', 'leon', 'luna', 'medina', 'mejia', 'mendoza', 'molina', 'morales', 'moreno', 'navarro', 'ochoa', 'ortega',
  'ortiz', 'pacheco', 'peña', 'ramos', 'reyes', 'rios', 'rivera', 'rojas', 'romero', 'ruiz', 'salazar', 'salinas', 'sandoval',
  'serrano', 'silva', 'solis', 'soto', 'torres', 'trejo', 'valencia', 'vargas', 'vasquez', 'vega', 'villa', 'zamora',
])

/**
 * The name as a list sorts it: "Dario Ferro" → "Ferro, Dario". Particles stay with their surname ("de la Cruz,
 * Ana"), a suffix comes last ("Smith, John, Jr."). Two surnames are kept together where a name has four words or
 * more, or three of which the middle one is a Spanish surname. Whose name sorts otherwise writes it with a comma
 * ("Le Thi, Hoa"), which is kept. A single name stays as it is; an empty one gives an empty text.
 */
export function sortNameOf(name: string): string {
  const clean = tidy(name)
  if (clean.includes(',') && !SUFFIX.test(clean.split(',').at(-1)?.trim() ?? '')) return clean
  const { given, surnames, suffix } = partsOf(clean)
  return [surnames.join(' '), given.join(' '), suffix].filter(part => part !== '').join(', ')
}

/** Two letters for a card check: the first given name's and the first surname's. A single name gives one letter. */
export function initialsOf(name: string): string {
  const clean = tidy(name)
  const [last = '', first = ''] = clean.includes(',') ? clean.split(',').map(part => part.trim()) : []
  const { given, surnames } = first !== '' && !SUFFIX.test(first) ? { given: [first], surnames: [last] } : partsOf(clean)
  return [given[0], surnames[0]].map(part => firstLetter(part ?? '')).join('')
}

/** Compares two sort names as people of a language expect: accents and case only decide between equals. */
export function compareSortNames(first: string, second: string, language: Language = 'en'): number {
  return new Intl.Collator(language, { sensitivity: 'variant', numeric: true }).compare(first, second)
}

function partsOf(name: string): NameParts {
  const words = name.replaceAll(',', ' ').split(' ').filter(word => word !== '')
  const last = words.at(-1) ?? ''
  const hasSuffix = words.length > 2 && SUFFIX.test(last)
  const units = joinParticles(hasSuffix ? words.slice(0, -1) : words)
  const count = surnameCount(units)
  return { given: units.slice(0, units.length - count), surnames: units.slice(units.length - count), suffix: hasSuffix ? last : '' }
}

/** Joins "de la Cruz" into one. A particle that opens the name is a name itself. */
function joinParticles(words: readonly string[]): string[] {
  const units: string[] = []
  let waiting: string[] = []
  for (const [index, word] of words.entries()) {
    if (index > 0 && index < words.length - 1 && PARTICLES.has(word.toLowerCase())) {
      waiting.push(word)
      continue
    }
    units.push([...waiting, word].join(' '))
    waiting = []
  }
  return units
}

function surnameCount(units: readonly string[]): number {
  if (units.length <= 2) return Math.min(1, units.length)
  const beforeLast = units.at(-2) ?? ''
  if (/^\p{L}\.?$/u.test(beforeLast)) return 1
  return units.length >= 4 || isSpanishSurname(beforeLast) ? 2 : 1
}

function isSpanishSurname(unit: string): boolean {
  const plain = unit.toLowerCase().normalize('NFD').replace(/n\u0303/g, 'ñ').replace(/[\u0300-\u0302\u0304-\u036F]/g, '')
  return plain.includes(' ') || /[a-zñ]{2}ez$/.test(plain) || SPANISH_SURNAMES.has(plain)
}

function firstLetter(unit: string): string {
  const words = unit.split(' ')
  const word = words.find((one, index) => index === words.length - 1 || !PARTICLES.has(one.toLowerCase())) ?? ''
  const [letter = ''] = word.match(/\p{L}\p{M}*|\p{N}/u) ?? []
  return letter.toUpperCase()
}

function tidy(name: string): string {
  return name.normalize('NFC').replace(/\s+/g, ' ').trim()
}
